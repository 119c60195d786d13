/**
 * Decision cells that another plan of the workbook decides as well: solving one plan then changes the other.
 */
import { resolveName } from '../formula/resolve-reference';
import { containsCell, rangesOverlap, type CellRange } from '../sheet/cell-range';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { cellsOfArea, type NamedArea } from './model-declaration';
import { statementIssue, type ModelIssue } from './model-issue';
import { listPlans, namesOfPlan, type PlanListing } from './naming-convention';

/** One warning for each other plan, at the first shared cell. Faults of the other plans are theirs. */
export function findSharedDecisions(
  workbook: WorkbookSnapshot,
  plan: PlanListing,
  decisions: readonly NamedArea[],
): ModelIssue[] {
  const ownRanges = decisions.flatMap((area) => area.ranges);
  return listPlans(workbook)
    .filter((other) => other.name !== plan.name)
    .flatMap((other): ModelIssue[] => {
      const otherRanges = decisionRangesOf(workbook, other);
      const touched = ownRanges.some((own) => otherRanges.some((range) => rangesOverlap(own, range)));
      if (!touched) {
        return [];
      }
      const shared = decisions
        .flatMap(cellsOfArea)
        .filter((cell) => otherRanges.some((range) => containsCell(range, cell)));
      return [statementIssue('shared-decision', shared[0], { plan: other.name, count: shared.length })];
    });
}

function decisionRangesOf(workbook: WorkbookSnapshot, plan: PlanListing): readonly CellRange[] {
  return namesOfPlan(workbook, plan)
    .filter(({ role }) => role === 'Decision')
    .flatMap(({ definedName }) => {
      const resolution = resolveName(workbook, definedName);
      return resolution.kind === 'ranges' ? resolution.ranges : [];
    });
}
