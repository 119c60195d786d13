import { kktResiduals } from '../../../solver-core/verification/kkt-residuals';
import { verifySolution } from '../../../solver-core/verification/verify-solution';
import { loadHighsOnce, solveWithHighs } from '../../oracles/highs-reference';
import { lp } from '../../support/lp-notation';
import { randomKinds, randomLinearProgram } from '../../support/random-linear-program';

// By hand: the rows meet at tiles = 4, bowls = 12; y solves y1 + 3 y2 = 30 and 2 y1 + y2 = 20, so y = (6, 8).
const week = lp(`
  maximise 30 tiles + 20 bowls + 5
  kiln:  tiles + 2 bowls <= 28
  press: 3 tiles + bowls <= 24`);
const x = Float64Array.of(4, 12);
const rowDuals = Float64Array.of(6, 8);

describe('SC-20 kktResiduals', () => {
  it('are all 0 at an optimum that is exact', () => {
    expect(kktResiduals(week, { x, rowDuals, reducedCosts: Float64Array.of(0, 0) })).toMatchObject({
      primal: 0,
      dual: 0,
      complementarity: 0,
      dualityGap: 0,
    });
  });

  it('measure a row violation relative to 1 + the largest term of the row', () => {
    // By hand: kiln = 4 + 2 · 12.5 = 29, 1 too much; largest term 25.
    const { primal, primalPlace } = kktResiduals(week, { x: Float64Array.of(3.5, 12.75), rowDuals });
    // kiln = 3.5 + 25.5 = 29; press = 10.5 + 12.75 = 23.25.
    expect(primal).toBeCloseTo(1 / 26.5, 14);
    expect(primalPlace).toEqual({ kind: 'row', index: 0 });
  });

  it('measure a bound violation relative to 1 + the value', () => {
    const { primal, primalPlace } = kktResiduals(week, { x: Float64Array.of(-1, 0), rowDuals });
    expect(primal).toBe(0.5);
    expect(primalPlace).toEqual({ kind: 'column', index: 0 });
  });

  it('find a dual value of the wrong sign for the sense', () => {
    const { dual, dualPlace } = kktResiduals(week, { x, rowDuals: Float64Array.of(6, -8) });
    expect(dual).toBeGreaterThan(0.5);
    expect(dualPlace).toBeDefined();
  });

  it('find a multiplier on a bound that is there but is not reached', () => {
    // x = 0 is feasible; the true duals stand on rows that are slack.
    const { primal, dual, dualityGap } = kktResiduals(week, { x: Float64Array.of(0, 0), rowDuals });
    expect(primal).toBe(0);
    expect(dual).toBeGreaterThan(0.5);
    // By hand: |5 − (5 + 6·28 + 8·24)| / 6.
    expect(dualityGap).toBe(60);
  });

  it('find claimed reduced costs that do not belong to the row duals', () => {
    const { dual } = kktResiduals(week, { x, rowDuals, reducedCosts: Float64Array.of(0, 1) });
    // By hand: 1 / (1 + largest of 20, 2·6 and 1·8).
    expect(dual).toBeCloseTo(1 / 21, 14);
  });

  it('count what is not a number, or infinite, as an infinite violation', () => {
    for (const bad of [NaN, Infinity]) {
      expect(kktResiduals(week, { x: Float64Array.of(bad, 0), rowDuals }).primal).toBe(Infinity);
      expect(verifySolution(week, { x, rowDuals: Float64Array.of(bad, 0) }).isOptimal).toBe(false);
    }
    expect(kktResiduals(week, { x, rowDuals: Float64Array.of(NaN, 0) }).dual).toBe(Infinity);
  });
});

describe('SC-21 verifySolution', () => {
  it('accepts the optimum and names what fails elsewhere', () => {
    expect(verifySolution(week, { x, rowDuals }).isOptimal).toBe(true);
    const verdict = verifySolution(week, { x: Float64Array.of(4, 12.001), rowDuals });
    expect(verdict).toMatchObject({
      isOptimal: false,
      reason: expect.stringContaining('Row "kiln"') as string,
    });
  });

  it('accepts a violation just under the threshold and refuses one just over it', () => {
    // kiln's largest term is 24, so it may be passed by 25e-7.
    const beyond = (by: number): boolean => {
      const { primal } = kktResiduals(week, { x: Float64Array.of(4, 12 + by / 2), rowDuals });
      return primal <= 1e-7;
    };
    expect(beyond(24e-7)).toBe(true);
    expect(beyond(26e-7)).toBe(false);
  });

  it('accepts every optimum of HiGHS whose violations are small, and none that is moved, seeds 3000 to 3199', async () => {
    const highs = await loadHighsOnce();
    let accepted = 0;
    let optimal = 0;
    for (let seed = 3000; seed < 3200; seed++) {
      const problem = randomLinearProgram(seed, randomKinds[seed % randomKinds.length]);
      const answer = solveWithHighs(highs, problem);
      if (answer.status !== 'optimal') continue;
      optimal++;
      if (verifySolution(problem, answer).isOptimal) accepted++;
      const moved = answer.rowDuals.map((y) => y + 0.01);
      if (problem.rowCount > 0 && problem.matrix.value.length > 0) {
        expect({
          seed,
          isOptimal: verifySolution(problem, { ...answer, rowDuals: moved }).isOptimal,
        }).toEqual({ seed, isOptimal: false });
      }
    }
    // HiGHS itself accepts absolute violations of 1e-7 in its scaled space; one in a hundred may be over ours.
    expect(accepted).toBeGreaterThanOrEqual(0.98 * optimal);
  });
});
