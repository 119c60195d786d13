/**
 * A small plan of an invented tile works, and ways to change it: three tiles, press and kiln hours, one order.
 *
 *        A             B (m²)      C (margin)  D (least)  E (most)  F (press h/m²)  G (kiln h/m²)
 *   2    Floor matt    10          6.5         blank      100       0.5             1
 *   3    Wall gloss    blank       8           blank      blank     0.25            2
 *   4    Border        blank       12          5          40        1               1.5
 *   7    Press hours   Σ B·F       <=          80
 *   8    Kiln hours    Σ B·G       <=          120
 *   9    Border order  B4          >=          15
 *   11   Contribution  Σ B·C
 */
import { MemoryWorkbook, type WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import type { AffineForm } from '../../../../addin/domain/linearization/affine-form';
import { readPlan, type PlanReading } from '../../../../addin/domain/model-from-sheet/read-plan';
import type { SheetModel } from '../../../../addin/domain/model-from-sheet/sheet-model';
import { cellText, columnOfLetters, formatCellAddress } from '../../../../addin/domain/sheet/cell-address';

export type Cells = WorkbookDescription['sheets'][string];
type Content = Exclude<Cells[string], readonly unknown[]>;

export const tileCells: Cells = {
  A1: [['Tile', 'm² planned', 'Margin', 'Least', 'Most', 'Press', 'Kiln', 'maximise']],
  A2: [
    ['Floor matt', 10, 6.5, null, 100, 0.5, 1],
    ['Wall gloss', null, 8, null, null, 0.25, 2],
    ['Border', null, 12, 5, 40, 1, 1.5],
  ],
  A6: 'Limits',
  A7: [
    ['Press hours', '=SUMPRODUCT(B2:B4,F2:F4)', '<=', 80],
    ['Kiln hours', '=SUMPRODUCT(B2:B4,G2:G4)', '<=', 120],
    ['Border order', '=B4', '>=', 15],
  ],
  A11: [['Contribution', '=SUMPRODUCT(B2:B4,C2:C4)']],
};

export const tileNames: Readonly<Record<string, string>> = {
  'Week.Decision': 'Plan!$B$2:$B$4',
  'Week.Objective': 'Plan!$B$11',
  'Week.Sense': 'Plan!$H$1',
  'Week.Constraint': 'Plan!$B$7:$D$9',
  'Week.Lower': 'Plan!$D$2:$D$4',
  'Week.Upper': 'Plan!$E$2:$E$4',
};

/** What differs from the plan above. */
export interface Changes extends Partial<Omit<WorkbookDescription, 'sheets' | 'names'>> {
  /** Cells of the sheet Plan, over those above; null clears. */
  readonly cells?: Cells;
  readonly otherSheets?: WorkbookDescription['sheets'];
  /** null takes a name away. */
  readonly names?: Readonly<Record<string, string | null>>;
}

/** A day without meaning, for TODAY and NOW. */
const now = 46_000;

export function tileWorkbook({ cells, otherSheets, names, ...rest }: Changes = {}): MemoryWorkbook {
  const plan = new Map([...singleCells(tileCells), ...singleCells(cells ?? {})]);
  const allNames = Object.entries({ ...tileNames, ...names }).filter(
    (entry): entry is [string, string] => entry[1] !== null,
  );
  return MemoryWorkbook.of({
    sheets: { Plan: Object.fromEntries(plan), ...otherSheets },
    names: Object.fromEntries(allNames),
    ...rest,
  });
}

/** Rows of cells taken apart, so that a change can replace or clear any one of them. */
function singleCells(cells: Cells): [string, Content][] {
  return Object.entries(cells).flatMap(([place, content]): [string, Content][] => {
    const [, letters, number] = /^([A-Z]+)(\d+)$/.exec(place)!;
    const [row, column] = [Number(number) - 1, columnOfLetters(letters)];
    const rows = Array.isArray(content) ? (content as Content[][]) : [[content as Content]];
    return rows.flatMap((line, i) =>
      line.map((cell, j): [string, Content] => [cellText(row + i, column + j), cell]),
    );
  });
}

export function readTiles(changes: Changes = {}, planName = 'Week'): PlanReading {
  return readPlan(tileWorkbook(changes).snapshot(), planName, { now });
}

/** The model of a plan that must be sound; fails with what is wrong otherwise. */
export function tileModel(changes: Changes = {}, planName = 'Week'): SheetModel {
  const { model, issues } = readTiles(changes, planName);
  if (model === null) {
    throw new Error(`The plan was to be read: ${issueTexts(issues).join(', ')}`);
  }
  return model;
}

/** `code at Plan!B7`, in the order reported. */
export function issueTexts(issues: PlanReading['issues']): string[] {
  return issues.map(({ code, cell }) => (cell === null ? code : `${code} at ${formatCellAddress(cell)}`));
}

/** A form by the labels of the decisions; the constant under '1' where it is not 0. */
export function termsOf(form: AffineForm, model: SheetModel): Record<string, number> {
  const terms: Record<string, number> = form.constant === 0 ? {} : { '1': form.constant };
  form.variables.forEach((variable, i) => {
    terms[model.decisions[variable].label] = form.coefficients[i];
  });
  return terms;
}

/** Every constraint row as `label: left relation right`, sides by `termsOf`. */
export function rowsOf(model: SheetModel): (readonly [string, object, string, object])[] {
  return model.constraintSets.flatMap((set) =>
    set.rows.map(
      ({ label, left, relation, right }) =>
        [label, termsOf(left, model), relation, termsOf(right, model)] as const,
    ),
  );
}
