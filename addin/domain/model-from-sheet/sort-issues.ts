/**
 * Issues in the order in which a planner goes through them: those without a cell first, then by place.
 */
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import type { ModelIssue } from './model-issue';

/** By sheet in the order of the tabs, row, column; at one place errors first. What is said twice is said once. */
export function sortIssues(workbook: WorkbookSnapshot, issues: readonly ModelIssue[]): ModelIssue[] {
  const places = new Map(workbook.sheets.map((sheet, place) => [sheet.name.toLowerCase(), place]));
  const placeOf = ({ cell }: ModelIssue): readonly [number, number, number] =>
    cell === null ? [-1, 0, 0] : [places.get(cell.sheet.toLowerCase()) ?? places.size, cell.row, cell.column];
  return withoutRepeats(issues)
    .map((issue) => ({ issue, place: [...placeOf(issue), issue.severity === 'error' ? 0 : 1] }))
    .sort((a, b) => comparePlaces(a.place, b.place))
    .map(({ issue }) => issue);
}

function comparePlaces(a: readonly number[], b: readonly number[]): number {
  const differing = a.findIndex((part, i) => part !== b[i]);
  return differing < 0 ? 0 : a[differing] - b[differing];
}

/** A faulty cell on which many rows build is reported by each of them. */
function withoutRepeats(issues: readonly ModelIssue[]): ModelIssue[] {
  const seen = new Set<string>();
  return issues.filter(({ code, cell, facts }) => {
    const place = cell === null ? '' : `${cell.sheet}\n${cell.row}\n${cell.column}`;
    // A formula's fault is the same whichever row found it, though the chain of cells that leads there differs.
    const told = JSON.stringify(facts, (fact, value: unknown) => (fact === 'chain' ? undefined : value));
    const key = `${code}\n${place}\n${told}`;
    const isNew = !seen.has(key);
    seen.add(key);
    return isNew;
  });
}
