/**
 * What stands around a sheet's cells in parts of their own: tables, notes and comments, PivotTables. Found through
 * the sheet's relationships.
 */
import type { CellAddress } from '../../domain/sheet/cell-address';
import type { CellRange } from '../../domain/sheet/cell-range';
import type { TableSnapshot } from '../../domain/sheet/sheet-snapshot';
import { parseCell, parseRange } from './cell-reference';
import { damagedFile, excerpt } from './file-faults';
import type { PackageParts } from './package-parts';
import type { SheetMarks } from './sheet-cells';
import { attributeOf, mainNamespaces } from './xml-events';
import { childOf, childrenOf, type XmlNode } from './xml-tree';
import { unescapeCellText } from './xml-escapes';

export interface SheetSurroundings extends SheetMarks {
  readonly tables: readonly TableSnapshot[];
}

/** @throws WorkbookError damaged where a part that the sheet refers to is missing or broken */
export async function readSurroundings(
  parts: PackageParts,
  sheetPart: string,
  sheetName: string,
): Promise<SheetSurroundings> {
  const tables: TableSnapshot[] = [];
  const notedCells: CellAddress[] = [];
  const pivotRanges: CellRange[] = [];
  let hasActiveTableFilter = false;
  for (const { kind, target } of await parts.relationshipsOf(sheetPart)) {
    if (target === undefined) continue;
    switch (kind) {
      case 'table': {
        const root = await parts.readTree(target);
        tables.push(tableOf(root, sheetName, parts.fileName));
        if (childOf(childOf(root, 'autoFilter', mainNamespaces), 'filterColumn', mainNamespaces)) {
          hasActiveTableFilter = true;
        }
        break;
      }
      case 'comments':
      case 'threadedComment':
        for (const place of notedPlaces(await parts.readTree(target))) {
          notedCells.push({ sheet: sheetName, ...place });
        }
        break;
      case 'pivotTable': {
        const range = pivotRange(await parts.readTree(target), sheetName);
        if (range !== undefined) pivotRanges.push(range);
        break;
      }
    }
  }
  return { tables, notedCells: withoutRepeats(notedCells), pivotRanges, hasActiveTableFilter };
}

function tableOf(root: XmlNode, sheetName: string, fileName: string): TableSnapshot {
  const name = attributeOf(root.tag, 'displayName') ?? attributeOf(root.tag, 'name') ?? '';
  const range = parseRange(sheetName, attributeOf(root.tag, 'ref') ?? '');
  if (name === '' || range === undefined) {
    throw damagedFile(fileName, `a table on its sheet ${excerpt(sheetName)} has no name or no place`);
  }
  const columns = childrenOf(childOf(root, 'tableColumns', mainNamespaces), 'tableColumn', mainNamespaces);
  return {
    name,
    range,
    headerRowCount: Number(attributeOf(root.tag, 'headerRowCount') ?? 1),
    totalsRowCount: Number(attributeOf(root.tag, 'totalsRowCount') ?? 0),
    columnNames: columns.map((column) => unescapeCellText(attributeOf(column.tag, 'name') ?? '')),
  };
}

/** Notes list `comment` elements inside a list; threaded comments stand directly in their root. */
function* notedPlaces(node: XmlNode): Generator<{ row: number; column: number }> {
  for (const child of node.children) {
    if (child.local === 'commentList') yield* notedPlaces(child);
    else if (child.local === 'comment' || child.local === 'threadedComment') {
      const place = parseCell(attributeOf(child.tag, 'ref') ?? '');
      if (place !== undefined) yield place;
    }
  }
}

/** Where a PivotTable stands, with its page filters: these stand above it, with one row between. */
function pivotRange(root: XmlNode, sheetName: string): CellRange | undefined {
  const location = childOf(root, 'location', mainNamespaces);
  if (location === undefined) return undefined;
  const range = parseRange(sheetName, attributeOf(location.tag, 'ref') ?? '');
  const pageRows = Number(attributeOf(location.tag, 'rowPageCount') ?? 0);
  if (range === undefined || !(pageRows > 0)) return range;
  return { ...range, top: Math.max(0, range.top - pageRows - 1) };
}

function withoutRepeats(cells: readonly CellAddress[]): CellAddress[] {
  const seen = new Set<string>();
  return cells.filter(({ row, column }) => {
    const key = `${row},${column}`;
    return !seen.has(key) && seen.add(key) !== undefined;
  });
}
