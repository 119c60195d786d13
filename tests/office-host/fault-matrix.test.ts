/**
 * Whatever Excel fails with, and whenever, ends in one of the ways that are named, with a sentence of its own.
 */
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { checkoutFolder } from '../support/needs';
import { faultCodes, roundTripsOf, runFaultMatrix, type FaultEnd, type FaultOutcome } from './fault-matrix';
import { faultTable, faultTablePath } from './fault-table';

/** By the design: a read is refused, a write is whole or undone or kept for later, and what is kept stays kept. */
function mayEndAs({ operation, roundTrip, code, isLasting }: FaultOutcome): readonly FaultEnd[] {
  // An answer that is too large is asked for again in smaller pieces.
  const isAskedAgain = code === 'ResponsePayloadSizeLimitExceeded' && !isLasting;
  switch (operation) {
    case 'read':
      return isAskedAgain ? ['refused', 'done'] : ['refused'];
    case 'write':
      if (roundTrip === 1) return isAskedAgain ? ['done'] : ['refused'];
      return isLasting ? ['kept'] : ['taken back'];
    case 'put back':
    case 'finish':
      return ['kept'];
  }
}

describe('the fault matrix', () => {
  let outcomes: readonly FaultOutcome[] = [];

  beforeAll(async () => {
    outcomes = await runFaultMatrix();
  }, 300_000);

  it('has every error at every round trip, once and lasting', () => {
    const roundTrips = Object.values(roundTripsOf).reduce((sum, count) => sum + count, 0);
    expect(outcomes).toHaveLength(faultCodes.length * roundTrips * 2);
  });

  it('ends as the design says', () => {
    for (const outcome of outcomes) {
      const { operation, roundTrip, code, isLasting, end } = outcome;
      const place = `${code} at ${operation} ${roundTrip}${isLasting ? ', lasting' : ''}`;
      expect([place, mayEndAs(outcome)]).toEqual([place, expect.arrayContaining([end])]);
    }
  });

  it('tells the planner each time in whole sentences', () => {
    for (const { end, sentence, code } of outcomes) {
      expect([code, end === 'done' ? '' : sentence]).toEqual([
        code,
        end === 'done' ? '' : expect.stringMatching(/^[A-Z].*\.$/s),
      ]);
      expect(sentence).not.toContain('..');
    }
  });

  it('stands as a table in the repository', () => {
    const standing = readFileSync(path.join(checkoutFolder, faultTablePath), 'utf8');
    expect(faultTable(outcomes)).toBe(standing);
  });
});
