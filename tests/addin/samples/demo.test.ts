/** `npm run demo`: what the README shows is what is printed. */
import { mkdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { checkoutFolder, itNeeds } from '../../support/needs';
import {
  recalculateInLibreOffice,
  saveAnewInLibreOffice,
  storedFormulaValues,
} from '../../support/recalculate-in-libreoffice';
import { WorkFolder } from '../../support/run-planrow';
import { inspectZip } from '../../support/zip-inspector';

/** Times and the count of iterations may change without the README being wrong. */
const withoutEffort = (line: string): boolean => !line.includes('Solved in');

const linesOf = (text: string): string[] =>
  text
    .split('\n')
    .map((line) => line.trimEnd())
    .filter(withoutEffort);

const sample = path.join('addin', 'samples', 'week-plan.xlsx');
const sampleBytes = readFileSync(path.join(checkoutFolder, sample));

describe('the demo', () => {
  const folder = new WorkFolder();

  beforeAll(() => {
    mkdirSync(path.join(folder.path, path.dirname(sample)), { recursive: true });
    folder.write(sample, sampleBytes);
  });
  afterAll(() => folder.remove());

  it('prints what the README shows, line by line', () => {
    const { exitCode, stdout } = folder.run('solve', sample);
    expect(exitCode).toBe(0);
    const readme = readFileSync(path.join(checkoutFolder, 'README.md'), 'utf8');
    const [, shown = ''] = /```text\n([\s\S]*?)```/.exec(readme) ?? [];
    expect(linesOf(stdout.trimEnd())).toEqual(linesOf(shown.trimEnd()));
  });

  it('leaves every part that it need not edit as it was packed: chart, notes, tables, costs', () => {
    folder.run('solve', sample, '--out', 'parts.xlsx');
    const written = new Map(inspectZip(folder.read('parts.xlsx')).map((entry) => [entry.name, entry.packed]));
    const changed = inspectZip(sampleBytes)
      .filter(({ name, packed }) => written.get(name)?.equals(packed) !== true)
      .map(({ name }) => name);
    expect(changed.sort()).toEqual([
      '[Content_Types].xml',
      'xl/_rels/workbook.xml.rels',
      'xl/styles.xml',
      'xl/workbook.xml',
      'xl/worksheets/sheet1.xml',
      'xl/worksheets/sheet2.xml',
    ]);
  });

  itNeeds(
    'libreOffice',
    'writes a workbook whose every stored value, the objective’s among them, LibreOffice works out the same',
    () => {
      const { json } = folder.runJson('solve', sample, '--out', 'solved.xlsx');
      const solved = folder.read('solved.xlsx');
      const recalculated = recalculateInLibreOffice(solved);
      const stored = storedFormulaValues(solved);
      expect(stored.map((sheet) => sheet.size)).toEqual([84, 139, 18]);
      stored.forEach((sheet, position) => {
        for (const [cell, value] of sheet) {
          const theirs = recalculated[position].get(cell);
          const isSame =
            value === theirs ||
            Math.abs(Number(theirs) - Number(value)) <= 1e-12 * Math.max(1, Math.abs(Number(value)));
          expect({ cell, value, theirs, isSame }).toEqual({ cell, value, theirs, isSame: true });
        }
      });
      expect(Math.abs(Number(recalculated[0].get('B3')) - Number(json.objective))).toBeLessThan(1e-6);
    },
    120_000,
  );

  itNeeds(
    'libreOffice',
    'finds its result columns again in a workbook that LibreOffice has saved since, and refreshes them',
    () => {
      folder.run('solve', sample, '--out', 'first.xlsx');
      folder.write('saved.xlsx', saveAnewInLibreOffice(folder.read('first.xlsx')));
      const { json } = folder.runJson('solve', 'saved.xlsx', '--out', 'second.xlsx');
      expect(json).toMatchObject({ status: 'optimal', issues: [] });
      const { blocks } = json.written as { blocks: { name: string; cell: string }[] };
      expect(blocks).toContainEqual({ name: 'Week.Optimum', cell: "'Week plan'!K7" });
      expect(blocks).toContainEqual({ name: 'Week.DualValue', cell: "'Week plan'!L22" });
    },
    120_000,
  );
});
