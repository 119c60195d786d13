/**
 * The sample plan, read, solved and written in Excel, comes out cell by cell as the .xlsx face writes it.
 */
import { InlineSolver } from '../../../../addin/adapters/solver-thread/inline-solver';
import type { WorkbookSnapshot } from '../../../../addin/domain/sheet/sheet-snapshot';
import type { Workbook } from '../../../../addin/ports/workbook';
import { solveModel, type SolvedModel } from '../../../../addin/use-cases/solve-model';
import { resultTexts } from '../../../../addin/wording/report-wording';
import { cellFacts, openInExcel, openSampleFile } from './open-in-excel';

jest.setTimeout(120_000);

const today = 46_000;

async function solve(workbook: Workbook): Promise<SolvedModel> {
  const solved = await solveModel({
    workbook,
    solver: new InlineSolver({ now: () => 0, pause: () => Promise.resolve() }),
    planName: null,
    options: {},
    keepDecisions: false,
    texts: resultTexts,
    today,
    clock: () => 0,
  });
  if (solved.kind !== 'solved') throw new Error(`The sample is ${solved.kind}.`);
  return solved;
}

function namesOf({ names }: WorkbookSnapshot): string[] {
  return names.map(({ name, scope, formula }) => `${scope ?? ''} ${name} ${formula}`).sort();
}

it('the sample is read as the file has it', async () => {
  const file = await (await openSampleFile()).read();
  const { workbook } = openInExcel(file);
  const read = await workbook.read();
  expect(cellFacts(read)).toEqual(cellFacts(file));
  expect(namesOf(read)).toEqual(namesOf(file));
  expect(read.tables).toEqual(file.tables);
  expect(read.usesDates1904).toBe(file.usesDates1904);
  for (const [position, sheet] of read.sheets.entries()) {
    const ofFile = file.sheets[position];
    expect([sheet.name, sheet.visibility, sheet.isProtected, sheet.hasActiveFilter]).toEqual([
      ofFile.name,
      ofFile.visibility,
      ofFile.isProtected,
      ofFile.hasActiveFilter,
    ]);
    expect(sheet.mergedRanges).toEqual(ofFile.mergedRanges);
    expect(sheet.notedCells).toEqual(ofFile.notedCells);
    for (let line = 0; line < 80; line++) {
      expect([line, sheet.isRowHidden(line), sheet.isColumnHidden(line)]).toEqual([
        line,
        ofFile.isRowHidden(line),
        ofFile.isColumnHidden(line),
      ]);
    }
  }
});

it.each(['1.9', '1.15'])(
  'the sample is solved and written as in the file, and again (ExcelApi %s)',
  async (requirementSet) => {
    const file = await openSampleFile();
    const { host, workbook } = openInExcel(await file.read(), { requirementSet });
    for (let round = 0; round < 2; round++) {
      const inFile = await solve(file);
      const inExcel = await solve(workbook);
      expect(inExcel.status).toBe('optimal');
      expect(inExcel.solution).toEqual(inFile.solution);
      expect(inExcel.writes?.columns).toEqual(inFile.writes?.columns);
      const [written, expected] = [await workbook.read(), await file.read()];
      expect(cellFacts(written)).toEqual(cellFacts(expected));
      expect(namesOf(written)).toEqual(namesOf(expected));
      expect(written.record).toBe(expected.record);
    }
    await new Promise((resolve) => setImmediate(resolve));
    expect(host.references.size).toBe(0);
  },
);

it('a solve takes three round trips to read and two to write', async () => {
  const { host, workbook } = openInExcel(await (await openSampleFile()).read());
  host.resetTraffic();
  await workbook.read();
  expect(host.traffic.roundTrips).toBe(3);
  host.resetTraffic();
  await solve(workbook);
  expect(host.traffic.roundTrips).toBe(5);
});
