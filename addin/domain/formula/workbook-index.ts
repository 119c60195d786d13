/**
 * A workbook's sheets, tables and names by their text, as formulas look them up: case does not count, and a name of
 * the formula's own sheet goes before one of the workbook.
 */
import type { DefinedName } from '../sheet/defined-name';
import type { SheetSnapshot, TableSnapshot, WorkbookSnapshot } from '../sheet/sheet-snapshot';

export class WorkbookIndex {
  private readonly sheets = new Map<string, SheetSnapshot>();
  private readonly tables = new Map<string, TableSnapshot>();
  private readonly names = new Map<string, DefinedName>();
  private readonly localNames = new Map<string, Map<string, DefinedName>>();

  constructor(readonly workbook: WorkbookSnapshot) {
    for (const sheet of workbook.sheets) {
      this.sheets.set(sheet.name.toLowerCase(), sheet);
    }
    for (const table of workbook.tables) {
      this.tables.set(table.name.toLowerCase(), table);
    }
    for (const name of workbook.names) {
      const names = name.scope === null ? this.names : this.localNamesOf(name.scope);
      names.set(name.name.toLowerCase(), name);
    }
  }

  sheet(name: string): SheetSnapshot | undefined {
    return this.sheets.get(name) ?? this.sheets.get(name.toLowerCase());
  }

  table(name: string): TableSnapshot | undefined {
    return this.tables.get(name.toLowerCase());
  }

  /** The table that a cell stands in. */
  tableAround(sheet: string, row: number, column: number): TableSnapshot | undefined {
    return this.workbook.tables.find(
      ({ range }) =>
        range.sheet.toLowerCase() === sheet.toLowerCase() &&
        row >= range.top &&
        row <= range.bottom &&
        column >= range.left &&
        column <= range.right,
    );
  }

  /** @param sheet the sheet before the name, or that of the formula; null where there is none */
  definedName(name: string, sheet: string | null): DefinedName | undefined {
    const key = name.toLowerCase();
    const local = sheet === null ? undefined : this.localNames.get(sheet.toLowerCase())?.get(key);
    return local ?? this.names.get(key);
  }

  private localNamesOf(sheet: string): Map<string, DefinedName> {
    const key = sheet.toLowerCase();
    let names = this.localNames.get(key);
    if (names === undefined) {
      names = new Map();
      this.localNames.set(key, names);
    }
    return names;
  }
}

const indexes = new WeakMap<WorkbookSnapshot, WorkbookIndex>();

/** The index that goes with a snapshot, made once. */
export function workbookIndexOf(workbook: WorkbookSnapshot): WorkbookIndex {
  let index = indexes.get(workbook);
  if (index === undefined) {
    index = new WorkbookIndex(workbook);
    indexes.set(workbook, index);
  }
  return index;
}
