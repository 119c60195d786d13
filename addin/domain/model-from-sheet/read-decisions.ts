/**
 * The decision cells: what they hold, whether they may be written to, and how they are called.
 */
import { cellKey, type CellAddress } from '../sheet/cell-address';
import { CellError } from '../sheet/cell-value';
import { containsCell, type CellRange } from '../sheet/cell-range';
import { findSheet, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { cellsOfArea, hullOf, type NamedArea } from './model-declaration';
import { statementIssue, type ModelIssue } from './model-issue';
import type { DecisionBlock } from './sheet-model';
import { isBlankText, looksLikeNumber } from './statement-words';

export interface DecisionReading {
  /** All blocks' cells, block by block, each row by row; a cell of two blocks twice. */
  readonly cells: readonly CellAddress[];
  /** As long as `cells`. */
  readonly before: readonly (number | null)[];
  readonly blocks: readonly DecisionBlock[];
  readonly issues: readonly ModelIssue[];
}

/** @param areas the plan's decision blocks by number */
export function readDecisions(workbook: WorkbookSnapshot, areas: readonly NamedArea[]): DecisionReading {
  const issues: ModelIssue[] = [];
  const cells: CellAddress[] = [];
  const before: (number | null)[] = [];
  const blocks = areas.map((area): DecisionBlock => {
    const first = cells.length;
    const arrayRanges = arrayRangesOf(workbook, area.ranges[0].sheet);
    for (const cell of cellsOfArea(area)) {
      cells.push(cell);
      before.push(readDecisionCell(workbook, area.name, cell, arrayRanges, issues));
    }
    return { number: area.number, range: hullOf(area), ranges: area.ranges, first, end: cells.length };
  });
  issues.push(...findDuplicates(areas));
  return { cells, before, blocks, issues };
}

/** Array formulas fill cells that hold no formula of their own: those cannot be decided either. */
function arrayRangesOf(workbook: WorkbookSnapshot, sheet: string): CellRange[] {
  const ranges: CellRange[] = [];
  findSheet(workbook, sheet)?.forEachCell((_row, _column, cell) => {
    if (cell.arrayRange !== undefined) {
      ranges.push(cell.arrayRange);
    }
  });
  return ranges;
}

function readDecisionCell(
  workbook: WorkbookSnapshot,
  name: string,
  cell: CellAddress,
  arrayRanges: readonly CellRange[],
  issues: ModelIssue[],
): number | null {
  const content = findSheet(workbook, cell.sheet)?.cell(cell.row, cell.column);
  if (content?.formula !== undefined || arrayRanges.some((range) => containsCell(range, cell))) {
    issues.push(statementIssue('decision-holds-formula', cell, { name }));
    return null;
  }
  const value = content?.value ?? null;
  if (typeof value === 'number') {
    if (content?.isDate === true) {
      issues.push(statementIssue('date-for-amount', cell, { name }));
    }
    return value;
  }
  if (typeof value === 'string' && !isBlankText(value)) {
    const code = looksLikeNumber(value) ? 'text-looks-like-number' : 'decision-holds-text';
    issues.push(statementIssue(code, cell, { name, text: value }));
  } else if (typeof value === 'boolean') {
    issues.push(statementIssue('truth-value-for-number', cell, { name }));
  } else if (value instanceof CellError) {
    issues.push(statementIssue('error-value-for-number', cell, { name, error: value.code }));
  }
  return null;
}

/** A cell that is decided twice: one issue a pair of blocks, at the first such cell. */
function findDuplicates(areas: readonly NamedArea[]): ModelIssue[] {
  const owners = new Map<string, Map<number, string>>();
  const doubles = new Map<string, { names: readonly string[]; cell: CellAddress; count: number }>();
  for (const area of areas) {
    for (const cell of cellsOfArea(area)) {
      const ofSheet = owners.get(cell.sheet.toLowerCase()) ?? new Map<number, string>();
      owners.set(cell.sheet.toLowerCase(), ofSheet);
      const key = cellKey(cell.row, cell.column);
      const owner = ofSheet.get(key);
      if (owner === undefined) {
        ofSheet.set(key, area.name);
        continue;
      }
      const pair = `${owner}\n${area.name}`;
      const known = doubles.get(pair) ?? { names: [owner, area.name], cell, count: 0 };
      doubles.set(pair, { ...known, count: known.count + 1 });
    }
  }
  return [...doubles.values()].map(({ names, cell, count }) =>
    statementIssue('duplicate-decision', cell, { names: [...new Set(names)], count }),
  );
}
