/**
 * The sample workbook: made by its script and nothing else, sound as a package, and right in its stored values.
 * Answers: LibreOffice's own recalculation; `highs` on the week written down from the figures and not from the sheet.
 */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import {
  TextReader,
  TextWriter,
  Uint8ArrayReader,
  Uint8ArrayWriter,
  ZipReader,
  ZipWriter,
} from '@zip.js/zip.js';
import { SaxesParser } from 'saxes';
import { tileWorksWeek } from '../../../addin/samples/tile-works-week';
import { packSampleWorkbook } from '../../../addin/samples/workbook-parts';
import { checkoutFolder, itNeeds, pathOfNeed } from '../../support/needs';

const samplePath = path.join(checkoutFolder, 'addin', 'samples', 'week-plan.xlsx');

async function partsOf(bytes: Uint8Array): Promise<Map<string, string>> {
  const reader = new ZipReader(new Uint8ArrayReader(bytes), { useWebWorkers: false });
  const parts = new Map<string, string>();
  for (const entry of await reader.getEntries()) {
    if (!entry.directory) {
      parts.set(entry.filename, await entry.getData(new TextWriter()));
    }
  }
  return parts;
}

describe('the sample workbook week-plan.xlsx', () => {
  it('is exactly what its script makes, byte for byte', async () => {
    const made = await packSampleWorkbook(tileWorksWeek());
    expect(Buffer.from(made).equals(readFileSync(samplePath))).toBe(true);
  });

  it('has well-formed parts only, each with a content type, and no relationship to a part that is not there', async () => {
    const parts = await partsOf(readFileSync(samplePath));
    for (const [name, content] of parts) {
      const parser = new SaxesParser({ xmlns: true, fileName: name });
      parser.on('error', (error) => {
        throw error;
      });
      parser.write(content).close();
    }
    const types = parts.get('[Content_Types].xml') ?? '';
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

  it('carries what a planner’s workbook carries: a chart, notes, tables, a pick list, print setup, a frozen heading', async () => {
    const parts = await partsOf(readFileSync(samplePath));
    const plan = parts.get('xl/worksheets/sheet1.xml') ?? '';
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
    expect(parts.get('xl/workbook.xml')).toContain('_xlnm.Print_Area');
  });

  it('leaves the columns right of both blocks free for results', () => {
    const [plan] = tileWorksWeek().sheets;
    const right = [...plan.cells.keys()].filter((cell) => !/^[A-H]\d+$/.test(cell));
    expect(right).toEqual([]);
  });

  itNeeds(
    'libreOffice',
    'holds the values that LibreOffice works out from its formulas',
    async () => {
      const recalculated = await recalculateInLibreOffice(readFileSync(samplePath));
      let formulas = 0;
      tileWorksWeek().sheets.forEach((sheet, position) => {
        const values = recalculated[position];
        for (const [name, cell] of sheet.cells) {
          if (cell.formula === undefined) {
            continue;
          }
          formulas++;
          const place = `${sheet.name}!${name}`;
          if (typeof cell.value === 'number') {
            const difference = Math.abs(Number(values.get(name)) - cell.value);
            expect({ place, isSame: difference <= 1e-12 * Math.max(1, Math.abs(cell.value)) }).toEqual({
              place,
              isSame: true,
            });
          } else {
            expect({ place, value: values.get(name) }).toEqual({ place, value: cell.value });
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

/** Every formula's stored value is taken out first, so that each value that comes back was worked out anew. */
async function recalculateInLibreOffice(bytes: Uint8Array): Promise<Map<string, string>[]> {
  const folder = mkdtempSync(path.join(tmpdir(), 'planrow-sample-'));
  try {
    const source = path.join(folder, 'week.xlsx');
    writeFileSync(source, await withoutStoredValues(bytes));
    execFileSync(
      pathOfNeed('libreOffice'),
      [
        `-env:UserInstallation=${pathToFileURL(path.join(folder, 'profile')).href}`,
        '--headless',
        '--convert-to',
        'xlsx',
        '--outdir',
        path.join(folder, 'out'),
        source,
      ],
      { stdio: 'ignore', timeout: 110_000 },
    );
    const parts = await partsOf(readFileSync(path.join(folder, 'out', 'week.xlsx')));
    expect([...parts.keys()].filter((name) => name.startsWith('xl/charts/chart'))).toHaveLength(1);
    return [1, 2, 3].map((sheet) => formulaValues(parts.get(`xl/worksheets/sheet${sheet}.xml`) ?? ''));
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function withoutStoredValues(bytes: Uint8Array): Promise<Uint8Array> {
  const zip = new ZipWriter(new Uint8ArrayWriter(), { useWebWorkers: false });
  for (const [name, content] of await partsOf(bytes)) {
    const text = name.startsWith('xl/worksheets/') ? content.replace(/<\/f><v>[^<]*<\/v>/g, '</f>') : content;
    await zip.add(name, new TextReader(text));
  }
  return zip.close();
}

/** The stored value of each formula of a sheet, as text, by cell. */
function formulaValues(xml: string): Map<string, string> {
  const cells = xml.matchAll(/<c r="([A-Z]+\d+)"[^>]*><f[^>]*>[^<]*<\/f><v>([^<]*)<\/v><\/c>/g);
  return new Map([...cells].map(([, name, value]) => [name, value]));
}
