/**
 * LibreOffice as an outside judge of stored values: it is given the workbook without any, and works them out anew.
 */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { pathOfNeed } from './needs';
import { buildZip } from './zip-builder';
import { inspectZip } from './zip-inspector';

/** The value of each formula as text, by its cell's A1 text, one map a sheet in the order of the sheets' parts. */
export type FormulaValues = readonly ReadonlyMap<string, string>[];

/** Values of formulas as a file stores them. */
export function storedFormulaValues(workbook: Uint8Array): FormulaValues {
  return sheetTexts(workbook).map(formulaValuesOf);
}

/**
 * Values of formulas as LibreOffice works them out.
 * To be called in a test that `itNeeds('libreOffice', …)` guards, with two minutes of time.
 */
export function recalculateInLibreOffice(workbook: Uint8Array): FormulaValues {
  return storedFormulaValues(saveAnewInLibreOffice(withoutStoredValues(workbook)));
}

/** The workbook opened and saved by LibreOffice. To be guarded and timed in the same way. */
export function saveAnewInLibreOffice(workbook: Uint8Array): Uint8Array {
  const folder = mkdtempSync(path.join(tmpdir(), 'planrow-recalculation-'));
  try {
    const source = path.join(folder, 'workbook.xlsx');
    writeFileSync(source, workbook);
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
    return readFileSync(path.join(folder, 'out', 'workbook.xlsx'));
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

const isSheet = (part: string): boolean => /^xl\/worksheets\/sheet\d+\.xml$/.test(part);

function sheetTexts(workbook: Uint8Array): string[] {
  return inspectZip(workbook)
    .filter((entry) => isSheet(entry.name))
    .sort((a, b) => a.name.localeCompare(b.name, 'en', { numeric: true }))
    .map((entry) => entry.content.toString('utf8'));
}

function withoutStoredValues(workbook: Uint8Array): Uint8Array {
  return buildZip(
    inspectZip(workbook).map(({ name, content }) => ({
      name,
      content: isSheet(name) ? content.toString('utf8').replace(/<\/f><v>[^<]*<\/v>/g, '</f>') : content,
    })),
  );
}

function formulaValuesOf(sheet: string): Map<string, string> {
  const cells = sheet.matchAll(/<c r="([A-Z]+\d+)"[^>]*><f[^>]*>[^<]*<\/f><v>([^<]*)<\/v><\/c>/g);
  return new Map([...cells].map(([, cell, value]) => [cell, value]));
}
