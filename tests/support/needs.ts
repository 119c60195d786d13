/**
 * What some tests need beyond `npm ci`: shared test problems, a browser, LibreOffice, and the like.
 *
 * A missing need counts as skipped, with the sentence how to get it in the test's name. On the build machine (CI=true)
 * everything that a package manager can bring must be there: a missing need then fails the test, so that a check
 * can never drop out of the run unseen. Only the shared folders may be missing there, since no package brings them.
 */
import { existsSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout's top folder. */
export const checkoutFolder = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..', '..');

export type NeedName = 'lpFolder' | 'sheetFixtures' | 'browser' | 'libreOffice' | 'openssl' | 'coinSamples';

export interface Need {
  /** Where it was found; undefined where it is missing. */
  readonly path: string | undefined;
  /** How to get it: one sentence, for whoever reads the list of skipped tests. */
  readonly remedy: string;
  /** A build machine may do without it. */
  readonly isOptionalInContinuousIntegration: boolean;
}

type Environment = Readonly<Record<string, string | undefined>>;

/** The first of the candidates that exists. */
function firstExisting(candidates: readonly (string | undefined)[]): string | undefined {
  return candidates.find((candidate) => candidate !== undefined && candidate !== '' && existsSync(candidate));
}

/** A program by its names, looked for in the folders of PATH. */
function findProgram(environment: Environment, ...programs: readonly string[]): string | undefined {
  const folders = (environment.PATH ?? '').split(path.delimiter).filter((folder) => folder !== '');
  return firstExisting(programs.flatMap((program) => folders.map((folder) => path.join(folder, program))));
}

/** Where each need stands on this machine. */
export function findNeeds(environment: Environment): Readonly<Record<NeedName, Need>> {
  return {
    lpFolder: {
      path: firstExisting(
        environment.PLANROW_LP === undefined
          ? [path.join(checkoutFolder, '..', 'shared', 'lp')]
          : [environment.PLANROW_LP],
      ),
      remedy:
        'put the shared folder of test problems beside the checkout as ../shared/lp, or set PLANROW_LP to it',
      isOptionalInContinuousIntegration: true,
    },
    sheetFixtures: {
      path: firstExisting([path.join(checkoutFolder, '..', 'shared', 'prototypes', 'sheets', 'fixtures')]),
      remedy: 'put the shared workbooks beside the checkout as ../shared/prototypes/sheets/fixtures',
      isOptionalInContinuousIntegration: true,
    },
    browser: {
      path:
        firstExisting([environment.PLANROW_CHROMIUM]) ??
        findProgram(environment, 'chromium', 'chromium-browser'),
      remedy: 'install Chromium (Debian: apt-get install chromium), or set PLANROW_CHROMIUM to its program',
      isOptionalInContinuousIntegration: false,
    },
    libreOffice: {
      path:
        firstExisting([environment.PLANROW_SOFFICE]) ?? findProgram(environment, 'soffice', 'libreoffice'),
      remedy:
        'install LibreOffice Calc (Debian: apt-get install libreoffice-calc-nogui), or set PLANROW_SOFFICE to soffice',
      isOptionalInContinuousIntegration: false,
    },
    openssl: {
      path: findProgram(environment, 'openssl'),
      remedy: 'install OpenSSL (Debian: apt-get install openssl)',
      isOptionalInContinuousIntegration: false,
    },
    coinSamples: {
      path: firstExisting(['/usr/share/coin/Data/Sample', '/usr/local/share/coin/Data/Sample']),
      remedy: 'install the sample problems (Debian: apt-get install coinor-libcoinutils-dev)',
      isOptionalInContinuousIntegration: false,
    },
  };
}

const needs = findNeeds(process.env);

/**
 * Where a need stands.
 * @throws Error when it is missing: call it inside a test that `itNeeds` guards
 */
export function pathOfNeed(name: NeedName): string {
  const found = needs[name].path;
  if (found === undefined) {
    throw new Error(`${name} is missing: ${needs[name].remedy}.`);
  }
  return found;
}

/** What becomes of a test with this need: it runs, counts as skipped, or fails. */
export function fateOfTest(need: Need, isContinuousIntegration: boolean): 'run' | 'skip' | 'fail' {
  if (need.path !== undefined) {
    return 'run';
  }
  return isContinuousIntegration && !need.isOptionalInContinuousIntegration ? 'fail' : 'skip';
}

const isContinuousIntegration = process.env.CI === 'true' || process.env.CI === '1';

/** `it`, for a test that cannot run without something that `npm ci` does not bring. */
export function itNeeds(
  name: NeedName,
  sentence: string,
  test: () => void | Promise<void>,
  timeoutMilliseconds?: number,
): void {
  const need = needs[name];
  const runTest = async (): Promise<void> => {
    await test();
  };
  switch (fateOfTest(need, isContinuousIntegration)) {
    case 'run':
      it(sentence, runTest, timeoutMilliseconds);
      return;
    case 'skip':
      it.skip(`${sentence} [to run it: ${need.remedy}]`, runTest);
      return;
    case 'fail':
      it(sentence, () => {
        throw new Error(`This test must run on the build machine: ${need.remedy}.`);
      });
  }
}

/**
 * `describe`, for tests that all need the same thing. The body is called in every case, so that each of its tests is
 * counted: read nothing of the need outside its tests.
 */
export function describeNeeds(name: NeedName, sentence: string, body: () => void): void {
  const need = needs[name];
  switch (fateOfTest(need, isContinuousIntegration)) {
    case 'run':
      describe(sentence, body);
      return;
    case 'skip':
      describe.skip(`${sentence} [to run it: ${need.remedy}]`, body);
      return;
    case 'fail':
      describe(sentence, () => {
        it('has what it needs', () => {
          throw new Error(`These tests must run on the build machine: ${need.remedy}.`);
        });
      });
  }
}
