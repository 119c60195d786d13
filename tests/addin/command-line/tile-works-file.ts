/**
 * A tile works' week as an .xlsx file, small enough to be solved by hand:
 *
 *   maximise 4 slate + 3 sand   kiln 2 slate + sand <= 10   press slate + sand <= 8   at least 1 m² of slate
 *   optimum slate 2, sand 6, objective 26; dual values kiln 1, press 2, order 0
 */
import { buildXlsx, type CellDescription, type SheetDescription } from '../../support/xlsx-builder';

export interface TileWorksChanges {
  readonly cells?: Readonly<Record<string, CellDescription>>;
  /** undefined takes a name away. */
  readonly names?: Readonly<Record<string, string | undefined>>;
  readonly sheet?: Partial<SheetDescription>;
  readonly furtherSheets?: readonly SheetDescription[];
}

const cells: Readonly<Record<string, CellDescription>> = {
  A1: 'Tile works, week 49',
  B4: 'Tile',
  C4: 'm² made',
  B5: 'Slate',
  C5: { value: 1, numberFormat: '#,##0.0' },
  B6: 'Sand',
  C6: { value: 1, numberFormat: '#,##0.0' },
  B8: 'Contribution',
  C8: { formula: '4*C5+3*C6', value: 7, numberFormat: '#,##0.00' },
  B10: 'Limits',
  A11: 'Kiln hours',
  B11: { formula: '2*C5+C6', value: 3 },
  C11: '<=',
  D11: { value: 10, numberFormat: '0.0' },
  A12: 'Press hours',
  B12: { formula: 'SUM(C5:C6)', value: 2 },
  C12: 'at most',
  D12: { value: 8, numberFormat: '0.0' },
  A13: 'Slate order',
  B13: { formula: 'C5', value: 1 },
  C13: '>=',
  D13: { value: 1, numberFormat: '0.0' },
};

const names: Readonly<Record<string, string>> = {
  'Week.Decision': 'Plan!$C$5:$C$6',
  'Week.Objective': 'Plan!$C$8',
  'Week.Sense': '"maximise"',
  'Week.Constraint': 'Plan!$B$11:$D$13',
};

export function tileWorksFile(changes: TileWorksChanges = {}): Uint8Array {
  const allNames = Object.entries({ ...names, ...changes.names }).filter(
    (entry): entry is [string, string] => entry[1] !== undefined,
  );
  return buildXlsx({
    sheets: [
      { name: 'Plan', cells: { ...cells, ...changes.cells }, ...changes.sheet },
      ...(changes.furtherSheets ?? []),
    ],
    names: Object.fromEntries(allNames),
  });
}
