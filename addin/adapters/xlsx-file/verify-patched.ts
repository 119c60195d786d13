/**
 * Proves a written workbook before anybody relies on it: read again from its bytes, every part that the plan does
 * not concern is byte-identical as packed, every formula is as it was, and the cells hold what was planned. It
 * shares the reader with the patch, but none of the patch.
 */
import { cellKey, formatCellAddress, type CellAddress } from '../../domain/sheet/cell-address';
import type { CellValue } from '../../domain/sheet/cell-value';
import type { DefinedName } from '../../domain/sheet/defined-name';
import { findSheet, type SheetCell } from '../../domain/sheet/sheet-snapshot';
import type { WritePlan } from '../../domain/results-to-sheet/write-plan';
import { WorkbookError } from '../../ports/workbook';
import { relationshipsPartOf, contentTypesPart } from './package-parts';
import { findRecord } from './record-part';
import { openPackage, readWorkbook, type OpenPackage, type ReadWorkbook } from './read-workbook';
import type { ReadSheet } from './sheet-cells';
import { mainNamespaces, type XmlSource } from './xml-events';
import { childOf, childrenOf, parseXmlTree } from './xml-tree';

/** What a cell must hold. */
interface ExpectedCell {
  readonly cell: CellAddress;
  /** null: blank. undefined: no value stored. */
  readonly value: CellValue | undefined;
  /** undefined: as before. */
  readonly formula: string | undefined;
  /** undefined: not said by the plan. */
  readonly numberFormat: string | undefined;
}

/**
 * @param before the file as it was, and `after` as it was written
 * @throws WorkbookError not-verified, naming the first difference
 */
export async function verifyPatched(
  before: Uint8Array,
  after: Uint8Array,
  plan: WritePlan,
  fileName: string,
): Promise<void> {
  const packageBefore = await openPackage(before, fileName);
  let packageAfter: OpenPackage;
  let workbookAfter: ReadWorkbook;
  try {
    packageAfter = await openPackage(after, fileName);
    workbookAfter = await readWorkbook(packageAfter);
  } catch (cause) {
    throw notVerified(fileName, 'what was written cannot be read again', cause);
  }
  const workbookBefore = await readWorkbook(packageBefore);
  const unchangedParts = await verifyParts(packageBefore, packageAfter, plan);
  const expected = expectedCells(plan, workbookBefore);
  verifySheets(packageBefore, workbookBefore, workbookAfter, expected, unchangedParts, plan);
  verifyNames(workbookBefore, workbookAfter, plan, fileName);

  const record = plan.filter((write) => write.kind === 'record').at(-1)?.json ?? workbookBefore.record;
  if (!isSameRecord(record, workbookAfter.record)) throw notVerified(fileName, 'its record differs');
  if (JSON.stringify(workbookAfter.tables) !== JSON.stringify(workbookBefore.tables)) {
    throw notVerified(fileName, 'a table has changed');
  }
}

/** Returns the parts that are byte-identical. */
async function verifyParts(
  before: OpenPackage,
  after: OpenPackage,
  plan: WritePlan,
): Promise<ReadonlySet<string>> {
  const { fileName } = before.parts;
  const { changed, removed } = await concernedParts(before, plan);
  const namesBefore = before.parts.archive.names.filter((name) => !removed.has(name));
  const namesAfter = after.parts.archive.names;
  if (namesBefore.some((name, index) => namesAfter[index] !== name)) {
    throw notVerified(fileName, 'its parts are not the ones it had, or not in their order');
  }
  const unchanged = new Set<string>();
  for (const name of namesBefore) {
    const [packedBefore, packedAfter] = [
      await before.parts.archive.readPacked(name),
      await after.parts.archive.readPacked(name),
    ];
    if (areSameBytes(packedBefore, packedAfter)) unchanged.add(name);
    else if (!changed.has(name)) throw notVerified(fileName, `its part ${name} has changed`);
  }
  const styles = (await before.parts.relationshipsOf(before.workbook.part)).find(
    ({ kind }) => kind === 'styles',
  );
  if (styles?.target !== undefined && !unchanged.has(styles.target)) {
    const [first, second] = [
      await before.parts.readText(styles.target),
      await after.parts.readText(styles.target),
    ];
    if (!onlyAddsFormats(first, second)) throw notVerified(fileName, `its part ${styles.target} has changed`);
  }
  for (const name of namesAfter.slice(namesBefore.length)) {
    // Every part that is new must unpack to what its checksum says.
    await after.parts.archive.read(name);
  }
  return unchanged;
}

/** Styles may grow by cell formats behind the ones that are there; all else in them stays to the character. */
function onlyAddsFormats(before: XmlSource, after: XmlSource): boolean {
  const pieces = (source: XmlSource): { around: string; formats: string[] } => {
    const list = childOf(parseXmlTree(source), 'cellXfs', mainNamespaces);
    const { text } = source;
    return {
      around: list === undefined ? text : text.slice(0, list.start) + text.slice(list.end),
      formats: childrenOf(list, 'xf', mainNamespaces).map((format) => text.slice(format.start, format.end)),
    };
  };
  const [first, second] = [pieces(before), pieces(after)];
  return (
    first.around === second.around && first.formats.every((format, index) => second.formats[index] === format)
  );
}

/** The parts that a plan may change or take out, said from the plan alone. */
async function concernedParts(
  { parts, workbook }: OpenPackage,
  plan: WritePlan,
): Promise<{ changed: ReadonlySet<string>; removed: ReadonlySet<string> }> {
  const changed = new Set<string>();
  const removed = new Set<string>();
  const relationships = await parts.relationshipsOf(workbook.part);
  const add = (part: string | undefined): void => {
    const exact = part === undefined ? undefined : parts.archive.exactName(part);
    if (exact !== undefined) changed.add(exact);
  };
  const addListing = (): void => {
    add(contentTypesPart);
    add(relationshipsPartOf(workbook.part));
  };
  const addSheet = (name: string): void =>
    add(workbook.sheets.find((sheet) => sheet.name.toLowerCase() === name.toLowerCase())?.part);
  for (const write of plan) {
    switch (write.kind) {
      case 'value':
      case 'formula':
        addSheet(write.cell.sheet);
        if (write.numberFormatOf !== undefined || (write.kind === 'value' && write.wrapsText === true)) {
          const styles = relationships.find(({ kind }) => kind === 'styles')?.target;
          add(styles);
          if (styles === undefined) addListing();
        }
        if (write.kind === 'formula') {
          const order = relationships.find(({ kind }) => kind === 'calcChain')?.target;
          if (order !== undefined && parts.has(order)) removed.add(parts.archive.exactName(order)!);
          if (order !== undefined) addListing();
        }
        break;
      case 'storedValue':
        addSheet(write.cell.sheet);
        break;
      case 'columnWidth':
        addSheet(write.sheet);
        break;
      case 'addSheet':
        addListing();
        add(workbook.part);
        break;
      case 'name':
      case 'removeName':
      case 'recalculateOnOpening':
        add(workbook.part);
        break;
      case 'record': {
        const record = await findRecord(parts, workbook.part);
        if (record === undefined) addListing();
        else add(record.part);
        break;
      }
    }
  }
  return { changed, removed };
}

/** What each written cell must hold in the end, by sheet (in lower case) and cellKey. */
function expectedCells(plan: WritePlan, before: ReadWorkbook): Map<string, Map<number, ExpectedCell>> {
  const expected = new Map<string, Map<number, ExpectedCell>>();
  const formatNow = (cell: CellAddress): string | undefined =>
    expected.get(cell.sheet.toLowerCase())?.get(cellKey(cell.row, cell.column))?.numberFormat ??
    findSheet(before, cell.sheet)?.cell(cell.row, cell.column)?.numberFormat;
  for (const write of plan) {
    if (write.kind !== 'value' && write.kind !== 'formula' && write.kind !== 'storedValue') continue;
    const sheet = write.cell.sheet.toLowerCase();
    const cells = expected.get(sheet) ?? new Map<number, ExpectedCell>();
    expected.set(sheet, cells);
    const key = cellKey(write.cell.row, write.cell.column);
    const source = write.kind === 'storedValue' ? undefined : write.numberFormatOf;
    cells.set(key, {
      cell: write.cell,
      value: write.value,
      formula: write.kind === 'formula' ? write.formula.replace(/^=/, '').trim() : cells.get(key)?.formula,
      numberFormat: source === undefined ? cells.get(key)?.numberFormat : formatNow(source),
    });
  }
  return expected;
}

function verifySheets(
  { parts, workbook }: OpenPackage,
  before: ReadWorkbook,
  after: ReadWorkbook,
  expected: ReadonlyMap<string, ReadonlyMap<number, ExpectedCell>>,
  unchangedParts: ReadonlySet<string>,
  plan: WritePlan,
): void {
  const { fileName } = parts;
  const added = plan.filter((write) => write.kind === 'addSheet').map(({ name }) => name);
  const wanted = [...before.sheets.map(({ name }) => name), ...added];
  if (wanted.length !== after.sheets.length || wanted.some((name, i) => after.sheets[i].name !== name)) {
    throw notVerified(fileName, 'its sheets are not the ones it should have');
  }
  after.sheets.forEach((sheetAfter, index) => {
    const cells = expected.get(sheetAfter.name.toLowerCase()) ?? new Map<number, ExpectedCell>();
    const sheetBefore = index < before.sheets.length ? before.sheets[index] : undefined;
    const isUntouched = index < before.sheets.length && unchangedParts.has(workbook.sheets[index].part);
    for (const { cell, value, formula, numberFormat } of cells.values()) {
      const found = sheetAfter.cell(cell.row, cell.column);
      const formulaWanted = formula ?? sheetBefore?.cell(cell.row, cell.column)?.formula;
      if (!isSameValue(value, found) || found?.formula !== formulaWanted) {
        throw notVerified(fileName, `${formatCellAddress(cell)} does not hold what was to be written`);
      }
      if (numberFormat !== undefined && found !== undefined && found.numberFormat !== numberFormat) {
        throw notVerified(
          fileName,
          `${formatCellAddress(cell)} does not have the number format that it should`,
        );
      }
    }
    if (!isUntouched) verifyOtherCells(sheetBefore, sheetAfter, cells, fileName);
  });
}

/** Cells that the plan does not name are as they were, in number, value and formula. */
function verifyOtherCells(
  before: ReadSheet | undefined,
  after: ReadSheet,
  expected: ReadonlyMap<number, ExpectedCell>,
  fileName: string,
): void {
  let remaining = 0;
  after.forEachCell((row, column) => {
    if (!expected.has(cellKey(row, column))) remaining++;
  });
  before?.forEachCell((row, column, cell) => {
    if (expected.has(cellKey(row, column))) return;
    remaining--;
    const found = after.cell(row, column);
    const isSame =
      found !== undefined &&
      found.formula === cell.formula &&
      found.numberFormat === cell.numberFormat &&
      Object.is(found.value, cell.value) &&
      JSON.stringify(found.arrayRange) === JSON.stringify(cell.arrayRange);
    if (!isSame) {
      throw notVerified(fileName, `${formatCellAddress({ sheet: after.name, row, column })} has changed`);
    }
  });
  const marks = (sheet: ReadSheet | undefined): string =>
    JSON.stringify([sheet?.mergedRanges ?? [], sheet?.notedCells ?? [], sheet?.isProtected ?? false]);
  if (remaining !== 0 || marks(before) !== marks(after)) {
    throw notVerified(fileName, `the sheet ${after.name} has changed where nothing was to be written`);
  }
}

function verifyNames(before: ReadWorkbook, after: ReadWorkbook, plan: WritePlan, fileName: string): void {
  const keyOf = ({ name, scope }: Pick<DefinedName, 'name' | 'scope'>): string =>
    `${name.toLowerCase()}|${scope?.toLowerCase() ?? ''}`;
  const wanted = new Map(before.names.map((name) => [keyOf(name), name.formula]));
  for (const write of plan) {
    if (write.kind === 'name') wanted.set(keyOf(write), write.formula.replace(/^=/, '').trim());
    if (write.kind === 'removeName') wanted.delete(keyOf(write));
  }
  const found = new Map(after.names.map((name) => [keyOf(name), name.formula]));
  for (const [key, formula] of wanted) {
    if (found.get(key) !== formula) {
      throw notVerified(fileName, `the name ${key.split('|')[0]} does not refer to what it should`);
    }
  }
  if (found.size !== wanted.size) throw notVerified(fileName, 'it has names that it should not have');
}

/** Blank cells may be absent; a formula that comes out blank has no value stored. */
function isSameValue(wanted: CellValue | undefined, found: SheetCell | undefined): boolean {
  const value = found?.value;
  if (wanted === undefined || wanted === null) return value === undefined || value === null;
  return wanted === value;
}

function isSameRecord(wanted: string | null, found: string | null): boolean {
  if (wanted === found) return true;
  if (wanted === null || found === null) return false;
  // Characters that XML cannot hold are kept as escapes inside the JSON: another text, the same record.
  try {
    return JSON.stringify(JSON.parse(wanted)) === JSON.stringify(JSON.parse(found));
  } catch {
    return false;
  }
}

function areSameBytes(a: Uint8Array, b: Uint8Array): boolean {
  return a.length === b.length && a.every((byte, index) => b[index] === byte);
}

function notVerified(fileName: string, why: string, cause?: unknown): WorkbookError {
  return new WorkbookError(
    'not-verified',
    `${fileName} was not saved, because ${why}; your file is as it was, and this is a fault of Planrow.`,
    { cause },
  );
}
