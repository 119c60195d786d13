/**
 * The sample workbook: made by its script and nothing else, sound as a package, and right in its stored values.
 * Answers: LibreOffice's own recalculation.
 */
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { SaxesParser } from 'saxes';
import { tileWorksWeek } from '../../../addin/samples/tile-works-week';
import { packSampleWorkbook } from '../../../addin/samples/workbook-parts';
import { checkoutFolder, itNeeds } from '../../support/needs';
import { recalculateInLibreOffice } from '../../support/recalculate-in-libreoffice';
import { inspectZip, textInZip } from '../../support/zip-inspector';

const sample = readFileSync(path.join(checkoutFolder, 'addin', 'samples', 'week-plan.xlsx'));
const parts = new Map(inspectZip(sample).map((entry) => [entry.name, entry.content.toString('utf8')]));

describe('the sample workbook week-plan.xlsx', () => {
  it('is exactly what its script makes, byte for byte', async () => {
    const made = await packSampleWorkbook(tileWorksWeek());
    expect(Buffer.from(made).equals(sample)).toBe(true);
  });

  it('has well-formed parts only, each with a content type, and no relationship to a part that is not there', () => {
    for (const [name, content] of parts) {
      const parser = new SaxesParser({ xmlns: true, fileName: name });
      parser.on('error', (error) => {
        throw error;
      });
      parser.write(content).close();
    }
    const types = textInZip(sample, '[Content_Types].xml');
    const unknown = [...parts.keys()].filter(
      (name) =>
        name !== '[Content_Types].xml' &&
        !/\.(rels|vml)$/.test(name) &&
        !types.includes(`PartName="/${name}"`),
    );
    expect(unknown).toEqual([]);
    const broken = [...parts].flatMap(([name, content]) => {
      if (!name.endsWith('.rels')) {
        return [];
      }
      const home = path.posix.dirname(path.posix.dirname(name));
      return [...content.matchAll(/Target="([^"]+)"/g)]
        .map(([, target]) => path.posix.normalize(path.posix.join(home, target)))
        .filter((target) => !parts.has(target));
    });
    expect(broken).toEqual([]);
  });

  it('carries what a planner’s workbook carries: a chart, notes, tables, a pick list, print setup, a frozen heading', () => {
    const plan = textInZip(sample, 'xl/worksheets/sheet1.xml');
    expect([...parts.keys()]).toEqual(
      expect.arrayContaining([
        'xl/charts/chart1.xml',
        'xl/comments1.xml',
        'xl/tables/table1.xml',
        'xl/styles.xml',
      ]),
    );
    for (const element of [
      '<pane ',
      '<dataValidation ',
      '<conditionalFormatting ',
      '<pageSetup ',
      '<legacyDrawing ',
    ]) {
      expect(plan).toContain(element);
    }
    expect(textInZip(sample, 'xl/workbook.xml')).toContain('_xlnm.Print_Area');
  });

  it('leaves the columns right of both blocks free for results', () => {
    const [plan] = tileWorksWeek().sheets;
    const right = [...plan.cells.keys()].filter((cell) => !/^[A-H]\d+$/.test(cell));
    expect(right).toEqual([]);
  });

  itNeeds(
    'libreOffice',
    'holds the values that LibreOffice works out from its formulas',
    () => {
      const recalculated = recalculateInLibreOffice(sample);
      let formulas = 0;
      tileWorksWeek().sheets.forEach((sheet, position) => {
        for (const [name, cell] of sheet.cells) {
          if (cell.formula === undefined) {
            continue;
          }
          formulas++;
          const place = `${sheet.name}!${name}`;
          const value = recalculated[position].get(name);
          if (typeof cell.value === 'number') {
            const difference = Math.abs(Number(value) - cell.value);
            const isSame = difference <= 1e-12 * Math.max(1, Math.abs(cell.value));
            expect({ place, value, isSame }).toEqual({ place, value, isSame: true });
          } else {
            expect({ place, value }).toEqual({ place, value: cell.value });
          }
        }
      });
      // Counted by hand. Plan: 12 × 4 + 5 totals + 14 left sides + 10 loads + 7 right sides; loading: 12 × 11 + 7;
      // costs: 12 contributions + 5 hours + 1 total.
      expect(formulas).toBe(84 + 139 + 18);
    },
    120_000,
  );
});
