/**
 * Published and pathological problems with known answers: cycling, degeneracy, exponential paths, ill-conditioned
 * matrices, and the plain worked examples of the textbooks, by author. Where the data of a case come from stands in
 * its `answerFrom`; each answer is worked out a second time by the exact oracle.
 */
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { solve, type LinearProgram } from '#solver-core';
import { LinearProgramBuilder } from '../../solver-core/linear-program/linear-program-builder';
import { solveExactly } from '../oracles/exact-tableau-simplex';
import { findEvidenceFaults } from '../support/find-evidence-faults';

interface TextbookCase {
  readonly id: string;
  readonly title: string;
  readonly answerFrom: string;
  readonly sense: 'minimise' | 'maximise';
  readonly costs: readonly number[];
  readonly rows: readonly (readonly [
    coefficients: readonly number[],
    relation: '<=' | '>=' | '=',
    rightSide: number,
  ])[];
  /** 0 where left out; "-inf" for none. */
  readonly lower?: readonly (number | '-inf')[];
  readonly upper?: readonly number[];
  readonly status: 'optimal' | 'infeasible' | 'unbounded';
  readonly objective?: number;
  /** Stated only where the optimum, or the dual optimum, is unique. */
  readonly x?: readonly number[];
  readonly rowDuals?: readonly number[];
  readonly reducedCosts?: readonly number[];
}

const cases = JSON.parse(
  readFileSync(path.join(__dirname, 'cases', 'textbook.json'), 'utf8'),
) as readonly TextbookCase[];

function toLinearProgram(stated: TextbookCase): LinearProgram {
  const builder = new LinearProgramBuilder({ name: stated.id, sense: stated.sense });
  stated.costs.forEach((cost, column) => {
    const lower = stated.lower?.[column] ?? 0;
    builder.addColumn({
      cost,
      lower: lower === '-inf' ? -Infinity : lower,
      upper: stated.upper?.[column] ?? Infinity,
    });
  });
  for (const [coefficients, relation, rightSide] of stated.rows) {
    const row = builder.addRow({
      lower: relation === '<=' ? -Infinity : rightSide,
      upper: relation === '>=' ? Infinity : rightSide,
    });
    coefficients.forEach((coefficient, column) => builder.addEntry(row, column, coefficient));
  }
  return builder.build();
}

/** Relative, with 1 as the least to be relative to. */
const tolerance = 1e-7;

function expectClose(what: string, actual: ArrayLike<number>, expected: readonly number[]): void {
  const differences = expected.map((value, k) => Math.abs(actual[k] - value) / Math.max(1, Math.abs(value)));
  expect({ what, isClose: Math.max(...differences) <= tolerance, actual: Array.from(actual) }).toMatchObject({
    what,
    isClose: true,
  });
}

describe('textbook problems', () => {
  it.each(cases.map((stated) => [`${stated.title} [${stated.answerFrom}]`, stated] as const))(
    '%s',
    (_, stated) => {
      const problem = toLinearProgram(stated);
      for (const presolve of [true, false]) {
        const result = solve(problem, { presolve });
        expect(result.status).toBe(stated.status);
        expect(findEvidenceFaults(problem, result)).toEqual([]);
        if (result.status === 'optimal') {
          expectClose('objective', [result.objective], [stated.objective!]);
          // A Hilbert matrix leaves the point open in doubles; its objective is firm.
          if (!stated.id.startsWith('hilbert')) {
            if (stated.x !== undefined) expectClose('x', result.x, stated.x);
            if (stated.rowDuals !== undefined) expectClose('row duals', result.rowDuals, stated.rowDuals);
            if (stated.reducedCosts !== undefined)
              expectClose('reduced costs', result.reducedCosts, stated.reducedCosts);
          }
        }
      }
    },
  );

  it.each(cases.map((stated) => [stated.id, stated] as const))(
    '%s: the exact oracle finds the stated answer',
    (_, stated) => {
      const answer = solveExactly(toLinearProgram(stated));
      expect(answer.status).toBe(stated.status);
      if (answer.status === 'optimal') {
        expectClose('objective', [answer.objective], [stated.objective!]);
      }
    },
  );

  it('are all there: 33 cases that want no whole numbers', () => {
    expect(cases.length).toBe(33);
  });
});
