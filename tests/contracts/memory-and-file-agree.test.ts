/**
 * The workbook in memory and the one in a file were written apart from one another. Under random plans they must
 * take and refuse the same, and hold the same afterwards; and every file written must pass its own verification.
 */
import { MemoryWorkbook } from '../../addin/adapters/memory/memory-workbook';
import { verifyPatched } from '../../addin/adapters/xlsx-file/verify-patched';
import { XlsxWorkbook } from '../../addin/adapters/xlsx-file/xlsx-workbook';
import { cellText, type CellAddress } from '../../addin/domain/sheet/cell-address';
import { CellError } from '../../addin/domain/sheet/cell-value';
import type { WorkbookSnapshot } from '../../addin/domain/sheet/sheet-snapshot';
import type { WorkbookWrite } from '../../addin/domain/results-to-sheet/write-plan';
import { WorkbookError } from '../../addin/ports/workbook';
import { buildXlsx, type CellDescription, type XlsxDescription } from '../support/xlsx-builder';
import { inMemory } from './describe-in-memory';

type Random = (below: number) => number;

/** Linear congruential generator; constants after Numerical Recipes (from memory). */
function randomFrom(seed: number): Random {
  let state = seed;
  return (below) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return Math.floor((state / 2 ** 32) * below);
  };
}

const rows = 8;
const columns = 7;
const formats = ['0.00', '#,##0', 'yyyy\\-mm\\-dd', '0.0%'];
const texts = ['Wall tile', ' a < b & "c" ', 'two\nlines', 'ü😀', '', '_x0041_', '\u0001'];

function randomWorkbook(random: Random): XlsxDescription {
  const sheet = (name: string): XlsxDescription['sheets'][number] => {
    const cells: Record<string, CellDescription> = {};
    for (let row = 0; row < rows; row++) {
      for (let column = 0; column < columns; column++) {
        const at = cellText(row, column);
        const numberFormat = random(3) === 0 ? formats[random(formats.length)] : undefined;
        switch (random(6)) {
          case 0:
            cells[at] = { value: random(1000) / 8, numberFormat };
            break;
          case 1:
            cells[at] = { value: texts[random(4)], numberFormat };
            break;
          case 2:
            cells[at] = {
              formula: `${cellText(random(rows), random(columns))}+1`,
              value: random(9),
              numberFormat,
            };
            break;
        }
      }
    }
    // One array formula and one merged cell a sheet, where they stand free of the random cells.
    cells.J1 = { formula: 'A1:A3*2', arrayRange: 'J1:J3', value: 1 };
    cells.J2 = 2;
    cells.J3 = 3;
    cells.L1 = 'merged';
    return { name, cells, merges: ['L1:M2'] };
  };
  return {
    hasInlineStrings: random(2) === 0,
    sheets: [sheet('Plan'), sheet('Cost data')],
    names: { 'Week.Decision': 'Plan!$A$1', Rate: '0.25' },
  };
}

function randomPlan(random: Random): WorkbookWrite[] {
  const sheets = ['Plan', 'Cost data'];
  const plan: WorkbookWrite[] = [];
  const place = (): CellAddress => {
    const special = random(25);
    const sheet = sheets[random(sheets.length)];
    if (special === 0) return { sheet, row: random(4), column: 9 };
    if (special === 1) return { sheet, row: random(3), column: 11 + random(2) };
    return { sheet, row: random(rows + 4), column: random(columns + 2) };
  };
  const value = (): number | string | boolean =>
    [random(1000) / 7, texts[random(texts.length)], random(2) === 0, -0][random(4)];
  const length = 1 + random(5);
  for (let count = 0; count < length; count++) {
    switch (random(9)) {
      case 0:
      case 1:
        plan.push({ kind: 'value', cell: place(), value: value() });
        break;
      case 2:
        plan.push({ kind: 'value', cell: place(), value: null });
        break;
      case 3:
        plan.push({ kind: 'value', cell: place(), value: value(), wrapsText: random(2) === 0 });
        break;
      case 4:
        plan.push({ kind: 'storedValue', cell: place(), value: random(3) === 0 ? undefined : value() });
        break;
      case 5:
        plan.push({ kind: 'formula', cell: place(), formula: 'SUM(A1:B2)&"<"', value: value() });
        break;
      case 6:
        plan.push({
          kind: 'name',
          name: ['Week.Optimum', 'RATE', 'Week.Slack'][random(3)],
          scope: random(3) === 0 ? sheets[random(sheets.length)] : null,
          formula: `Plan!$A$${1 + random(9)}`,
        });
        break;
      case 7: {
        const name = ['Week results', 'More', 'plan'][random(3)];
        plan.push({ kind: 'addSheet', name });
        if (name !== 'plan') sheets.push(name);
        break;
      }
      case 8:
        plan.push({
          kind: 'columnWidth',
          sheet: sheets[random(sheets.length)],
          column: random(9),
          width: 8 + random(9),
        });
        break;
    }
  }
  return plan;
}

/** Everything that can be compared, in one order. A formula that comes out blank has no value stored. */
function facts(workbook: WorkbookSnapshot): unknown {
  return {
    sheets: workbook.sheets.map((sheet) => {
      const cells: [string, unknown[]][] = [];
      sheet.forEachCell((row, column, cell) => {
        const value = cell.value instanceof CellError ? cell.value.code : (cell.value ?? null);
        if (value === null && cell.formula === undefined) return;
        cells.push([
          cellText(row, column),
          [value, cell.formula, cell.numberFormat, cell.arrayRange?.bottom],
        ]);
      });
      return [sheet.name, cells.sort(([a], [b]) => (a < b ? -1 : 1))];
    }),
    names: workbook.names
      .map(({ name, scope, formula }) => `${name.toLowerCase()} ${scope ?? ''} ${formula}`)
      .sort(),
  };
}

async function outcome(work: Promise<void>): Promise<string> {
  try {
    await work;
    return 'taken';
  } catch (error) {
    if (!(error instanceof WorkbookError)) throw error;
    return error.code;
  }
}

it.each([1, 2, 3, 4])(
  '40 random plans come out the same in memory and in a file (seed %i)',
  async (seed) => {
    const random = randomFrom(seed);
    let taken = 0;
    for (let round = 0; round < 40; round++) {
      const description = randomWorkbook(random);
      const bytes = buildXlsx(description);
      const file = await XlsxWorkbook.open(bytes, 'week.xlsx');
      const memory = MemoryWorkbook.of(inMemory(description));
      expect(facts(await file.read())).toEqual(facts(await memory.read()));
      const plan = randomPlan(random);
      const inFile = await outcome(file.apply(plan));
      const inMemoryToo = await outcome(memory.apply(plan));
      // Of several faults in one plan, either may be named; with one write there is one fault at most.
      const named = (code: string): string => (plan.length > 1 && code !== 'taken' ? 'refused' : code);
      expect({ plan, outcome: named(inFile) }).toEqual({ plan, outcome: named(inMemoryToo) });
      expect({ plan, facts: facts(await file.read()) }).toEqual({ plan, facts: facts(await memory.read()) });
      if (inFile === 'taken') {
        taken++;
        await verifyPatched(bytes, file.bytes(), plan, 'week.xlsx');
      }
    }
    expect(taken).toBeGreaterThan(10);
  },
  60_000,
);
