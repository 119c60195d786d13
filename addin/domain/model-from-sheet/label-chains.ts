/**
 * The chain of cells from a decision to a faulty formula, with each cell called as its row is called on the sheet:
 * `Floor matt (Plan!B2)` tells a planner more than `Plan!B2`.
 */
import { resolveReferenceText } from '../formula/resolve-reference';
import { formatCellAddress } from '../sheet/cell-address';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import type { LabelFinder } from './find-labels';
import type { ModelIssue } from './model-issue';
import type { DecisionCell } from './sheet-model';

/** @param decisions the labelled decision cells */
export function labelChains(
  issues: readonly ModelIssue[],
  decisions: readonly Pick<DecisionCell, 'cell' | 'label'>[],
  workbook: WorkbookSnapshot,
  finder: LabelFinder,
): ModelIssue[] {
  const decisionLabels = new Map(decisions.map(({ cell, label }) => [formatCellAddress(cell), label]));
  const called = (address: string): string => {
    const label = decisionLabels.get(address) ?? labelBeside(address, workbook, finder);
    return label === undefined || label.includes(address) ? (label ?? address) : `${label} (${address})`;
  };
  return issues.map((issue) => {
    const chain: unknown = 'chain' in issue.facts ? issue.facts.chain : undefined;
    return Array.isArray(chain)
      ? ({ ...issue, facts: { ...issue.facts, chain: chain.map(String).map(called) } } as ModelIssue)
      : issue;
  });
}

/** A chain that was cut in its middle has an ellipsis there, which is no cell. */
function labelBeside(address: string, workbook: WorkbookSnapshot, finder: LabelFinder): string | undefined {
  const resolution = address.includes('!') ? resolveReferenceText(workbook, address, null) : undefined;
  if (resolution?.kind !== 'ranges') {
    return undefined;
  }
  const [{ sheet, top, left }] = resolution.ranges;
  return finder.textBeside({ sheet, row: top, column: left });
}
