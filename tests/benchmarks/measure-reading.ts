/**
 * Reading a workbook with 100,000 formula cells: bytes in, model out.
 *
 * 1,000 products in rows. Beside each decision cell stand 100 formulas that depend on it, hours or costs on one of
 * 100 machines; under them 100 sums make the left sides, and a product sum over a further column the objective.
 */
import { XlsxWorkbook } from '../../addin/adapters/xlsx-file/xlsx-workbook';
import { buildLinearProgram } from '../../addin/domain/model-from-sheet/build-linear-program';
import { readPlan } from '../../addin/domain/model-from-sheet/read-plan';
import { buildXlsx, type CellDescription } from '../support/xlsx-builder';
import { inMilliseconds, table, timeOf } from './timing';

const products = 1000;
const machines = 100;
const rounds = 3;

/** A section of the report. */
export async function measureReading(): Promise<string> {
  const bytes = buildXlsx(workbookOfFormulas());
  const runs: { open: number; read: number; model: number; build: number; total: number }[] = [];
  let size = '';
  for (let round = 0; round < rounds; round++) {
    const open = await timeOf(() => XlsxWorkbook.open(bytes, 'plan.xlsx'));
    const read = await timeOf(() => open.value.read());
    const model = await timeOf(() => readPlan(read.value, 'Week', { now: 46000 }));
    if (model.value.model === null) {
      throw new Error(`the plan was not read: ${JSON.stringify(model.value.issues.slice(0, 3))}`);
    }
    const stated = model.value.model;
    const build = await timeOf(() => buildLinearProgram(stated));
    size = `${model.value.size!.decisions} decisions, ${model.value.size!.constraints} constraint rows, ${model.value.size!.nonzeros} nonzeros`;
    const parts = [open, read, model, build].map(({ milliseconds }) => milliseconds);
    runs.push({
      open: parts[0],
      read: parts[1],
      model: parts[2],
      build: parts[3],
      total: parts[0] + parts[1] + parts[2],
    });
  }
  const peak = Math.round(process.memoryUsage().rss / 2 ** 20);
  return [
    `## Reading ${(products * machines).toLocaleString('en')} formula cells`,
    '',
    `Bytes in to affine forms out: ${inMilliseconds(runs[0].total)} ms in a fresh process (figure to reach: 2,500), ` +
      `${inMilliseconds(Math.min(...runs.map(({ total }) => total)))} ms at best; ${(bytes.length / 2 ** 20).toFixed(1)} MB file, ${peak} MB resident. The model: ${size}.`,
    '',
    table(
      [
        'round',
        'open ms',
        'read cells ms',
        'formulas to model ms',
        'build problem ms',
        'total without build ms',
      ],
      runs.map(({ open, read, model, build, total }, round) =>
        [String(round + 1)].concat([open, read, model, build, total].map(inMilliseconds)),
      ),
    ),
  ].join('\n');
}

/** The letters of a column, counted from 0. */
function letters(column: number): string {
  return (column >= 26 ? letters(Math.floor(column / 26) - 1) : '') + String.fromCharCode(65 + (column % 26));
}

function workbookOfFormulas(): Parameters<typeof buildXlsx>[0] {
  const plan: Record<string, CellDescription> = {};
  const rates: Record<string, CellDescription> = {};
  // Plan: A label, B decision, C profit, D … the machines' hours; below them sums, relation, right sides.
  for (let product = 0; product < products; product++) {
    const row = product + 2;
    plan[`A${row}`] = `tile ${product + 1}`;
    plan[`B${row}`] = 0;
    plan[`C${row}`] = 10 + (product % 7);
    for (let machine = 0; machine < machines; machine++) {
      const column = letters(machine + 3);
      rates[`${column}${row}`] = ((product * 31 + machine * 17) % 9) + 0.5;
      plan[`${column}${row}`] = { formula: `$B${row}*Rates!${column}${row}+0.25*$B${row}`, value: 0 };
    }
  }
  const last = products + 1;
  const [sums, relations, limits] = [last + 1, last + 2, last + 3];
  for (let machine = 0; machine < machines; machine++) {
    const column = letters(machine + 3);
    plan[`${column}1`] = `machine ${machine + 1}`;
    plan[`${column}${sums}`] = { formula: `SUM(${column}2:${column}${last})`, value: 0 };
    plan[`${column}${relations}`] = '<=';
    plan[`${column}${limits}`] = 5000 + machine;
  }
  plan[`B${last + 5}`] = { formula: `SUMPRODUCT(B2:B${last},C2:C${last})`, value: 0 };
  const [first, end] = [letters(3), letters(machines + 2)];
  return {
    sheets: [
      { name: 'Plan', cells: plan },
      { name: 'Rates', cells: rates },
    ],
    names: {
      'Week.Decision': `Plan!$B$2:$B$${last}`,
      'Week.Objective': `Plan!$B$${last + 5}`,
      'Week.Sense': '"maximise"',
      'Week.Left': `Plan!$${first}$${sums}:$${end}$${sums}`,
      'Week.Relation': `Plan!$${first}$${relations}:$${end}$${relations}`,
      'Week.Right': `Plan!$${first}$${limits}:$${end}$${limits}`,
    },
  };
}
