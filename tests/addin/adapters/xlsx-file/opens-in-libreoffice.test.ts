/** LibreOffice as an outside judge: it must open what was written, show it, and calculate the formulas from it. */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { XlsxWorkbook } from '../../../../addin/adapters/xlsx-file/xlsx-workbook';
import type { CellAddress } from '../../../../addin/domain/sheet/cell-address';
import type { WritePlan } from '../../../../addin/domain/results-to-sheet/write-plan';
import { checkoutFolder, itNeeds, pathOfNeed } from '../../../support/needs';

const at = (sheet: string, row: number, column: number): CellAddress => ({ sheet, row, column });

/** The sheets as LibreOffice shows them: rows of texts by the sheet's name. */
function shownByLibreOffice(bytes: Uint8Array): Map<string, string[][]> {
  const folder = mkdtempSync(path.join(tmpdir(), 'tile-works-'));
  try {
    writeFileSync(path.join(folder, 'week.xlsx'), bytes);
    const profile = pathToFileURL(path.join(folder, 'profile')).href;
    // Every sheet to a file of its own (the last -1), unformatted numbers, UTF-8, fields apart by tabs.
    const filter = 'csv:Text - txt - csv (StarCalc):9,34,76,1,,0,false,false,false,false,false,-1';
    execFileSync(
      pathOfNeed('libreOffice'),
      [
        `-env:UserInstallation=${profile}`,
        '--headless',
        '--convert-to',
        filter,
        '--outdir',
        folder,
        path.join(folder, 'week.xlsx'),
      ],
      { stdio: 'ignore', timeout: 110_000 },
    );
    const shown = new Map<string, string[][]>();
    for (const name of readdirSync(folder)) {
      const match = /^week-(.*)\.csv$/.exec(name);
      if (match === null) continue;
      const text = readFileSync(path.join(folder, name), 'utf8');
      const lines = text.split('\n').map((line) => line.split('\t'));
      // Numbers stand in quotes too.
      shown.set(
        match[1],
        lines.map((fields) => fields.map((field) => field.replace(/^"(.*)"$/, '$1'))),
      );
    }
    return shown;
  } finally {
    rmSync(folder, { recursive: true });
  }
}

itNeeds(
  'libreOffice',
  'LibreOffice opens the written week, shows what was written, and calculates from it what was left to calculate',
  async () => {
    const before = new Uint8Array(
      readFileSync(path.join(checkoutFolder, 'tests', 'golden', 'tile-week.xlsx')),
    );
    const workbook = await XlsxWorkbook.open(before, 'tile-week.xlsx');
    const amounts = [110.5, 0, 200, 0.1 + 0.2];
    const plan: WritePlan = [
      ...amounts.flatMap((amount, index): WritePlan => [
        { kind: 'value', cell: at('Plan', 3 + index, 1), value: amount },
        { kind: 'storedValue', cell: at('Plan', 3 + index, 5), value: undefined },
        {
          kind: 'value',
          cell: at('Plan', 3 + index, 7),
          value: amount,
          numberFormatOf: at('Plan', 3 + index, 1),
        },
      ]),
      { kind: 'value', cell: at('Plan', 2, 7), value: 'Optimum <&> ü' },
      { kind: 'storedValue', cell: at('Plan', 8, 1), value: undefined },
      { kind: 'storedValue', cell: at('Plan', 11, 1), value: 8.21 },
      { kind: 'columnWidth', sheet: 'Plan', column: 7, width: 14 },
      { kind: 'addSheet', name: 'Week results' },
      { kind: 'value', cell: at('Week results', 0, 0), value: 'Floor tile grey' },
      { kind: 'formula', cell: at('Week results', 0, 1), formula: 'Plan!B6', value: 200 },
      { kind: 'formula', cell: at('Week results', 1, 1), formula: 'SUM(Week.Optimum)', value: 310.8 },
      { kind: 'name', name: 'Week.Optimum', scope: null, formula: 'Plan!$H$4:$H$7' },
      { kind: 'record', json: '{}' },
      { kind: 'recalculateOnOpening' },
    ];
    await workbook.apply(plan);
    const shown = shownByLibreOffice(workbook.bytes());

    expect([...shown.keys()].sort()).toEqual(['Calendar', 'Cost data', 'Plan', 'Week results']);
    const rows = shown.get('Plan')!;
    expect(rows[2][7]).toBe('Optimum <&> ü');
    expect(rows.slice(3, 7).map((row) => Number(row[1]))).toEqual([110.5, 0, 200, 0.3]);
    expect(rows.slice(3, 7).map((row) => Number(row[7]))).toEqual([110.5, 0, 200, 0.3]);
    // By hand: margins 4.2, 4.6, 5.1 and 7.5 a square metre.
    const margins = [110.5 * 4.2, 0, 200 * 5.1, 0.3 * 7.5];
    rows.slice(3, 7).forEach((row, index) => expect(Number(row[5])).toBeCloseTo(margins[index], 9));
    expect(Number(rows[8][1])).toBeCloseTo(464.1 + 1020 + 2.25, 9);
    const results = shown.get('Week results')!;
    expect(results[0].slice(0, 2)).toEqual(['Floor tile grey', '200']);
    expect(Number(results[1][1])).toBeCloseTo(310.8, 9);
  },
  120_000,
);
