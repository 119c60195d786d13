/**
 * The public test problems of the shared folder (lp/), with the values to test against. Read only inside tests that
 * `itNeeds('lpFolder', …)` guards.
 */
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { gunzipSync } from 'node:zlib';
import { pathOfNeed } from './needs';

export type ProblemSet = 'netlib' | 'kennington' | 'infeas' | 'misc' | 'mip';

export interface ReferenceProblem {
  readonly set: ProblemSet;
  readonly name: string;
  readonly rows: number;
  readonly columns: number;
  /** Optimum, of the whole-number problem in the set `mip`; undefined where there is none. */
  readonly expected: number | undefined;
  /** Optimum without whole-number demands, as published (few digits), in the set `mip`. */
  readonly publishedRelaxation: number | undefined;
}

interface ReferenceEntry {
  readonly set: ProblemSet;
  readonly rows: number;
  readonly cols: number;
  readonly expected?: number;
  readonly publishedLpRelaxation?: number;
}

/** All problems of a set, in the order of the shared list. */
export function referenceProblems(set: ProblemSet): readonly ReferenceProblem[] {
  const list = JSON.parse(readFileSync(path.join(pathOfNeed('lpFolder'), 'reference.json'), 'utf8')) as {
    readonly problems: Readonly<Record<string, ReferenceEntry>>;
  };
  return Object.entries(list.problems)
    .filter(([, entry]) => entry.set === set)
    .map(([key, entry]) => ({
      set,
      name: key.slice(set.length + 1),
      rows: entry.rows,
      columns: entry.cols,
      expected: entry.expected,
      publishedRelaxation: entry.publishedLpRelaxation,
    }));
}

/** The MPS text of a problem. */
export function readReferenceText(set: ProblemSet, name: string): string {
  const file = path.join(pathOfNeed('lpFolder'), set, `${name}.mps.gz`);
  return gunzipSync(readFileSync(file)).toString('latin1');
}

/** The MPS text of one of Debian's sample problems. */
export function readCoinSample(name: string): string {
  return readFileSync(path.join(pathOfNeed('coinSamples'), `${name}.mps`), 'latin1');
}

/** |value − expected| relative to the expected value, with 1 as the least to be relative to. */
export function relativeDifference(value: number, expected: number): number {
  return Math.abs(value - expected) / Math.max(1, Math.abs(expected));
}
