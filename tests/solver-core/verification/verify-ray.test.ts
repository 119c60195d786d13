import {
  verifyFarkasRay,
  verifyUnboundedRay,
  withoutBlockedComponents,
  withoutForbiddenComponents,
} from '../../../solver-core/verification/verify-ray';
import { loadHighsOnce, solveWithHighs } from '../../oracles/highs-reference';
import { lp } from '../../support/lp-notation';
import { randomKinds, randomLinearProgram } from '../../support/random-linear-program';

describe('SC-22 verifyFarkasRay', () => {
  // By hand: a + b ≥ 5 against 2 a + 2 b ≤ 8. With y = (2, −1): g = 0, y · r ≥ 2·5 − 8 = 2 > 0.
  const clash = lp(`
    minimise a
    orders: a + b >= 5
    kiln: 2 a + 2 b <= 8`);

  it('accepts a proof, at any scale', () => {
    for (const scale of [1, 1e-12, 1e12]) {
      expect(verifyFarkasRay(clash, Float64Array.of(2 * scale, -scale))).toEqual({ isProof: true });
    }
  });

  it('refuses the opposite sign, zero, and what is not a number', () => {
    for (const y of [
      [-2, 1],
      [0, 0],
      [NaN, 1],
      [2, NaN],
      [Infinity, -1],
    ]) {
      expect(verifyFarkasRay(clash, Float64Array.from(y)).isProof).toBe(false);
    }
  });

  it('refuses a ray that calls for a row bound which is not there, however little', () => {
    const withThird = lp(`
      minimise a
      orders: a + b >= 5
      kiln: 2 a + 2 b <= 8
      glaze: a <= 3`);
    const y = Float64Array.of(2, -1, 1e-18);
    expect(verifyFarkasRay(withThird, y)).toMatchObject({
      isProof: false,
      reason: expect.stringContaining('glaze') as string,
    });
    expect(verifyFarkasRay(withThird, withoutForbiddenComponents(withThird, y))).toEqual({ isProof: true });
  });

  it('counts noise on a finite bound against the proof, at its full weight', () => {
    // g_a = −1e-6 · (−1e9 …): the column side reaches 1e-6 · 1e9 = 1000 > 2.
    const boxed = lp(`
      minimise a
      orders: 1.0000005 a + b >= 5
      kiln: 2 a + 2 b <= 8
      a <= 1e9`);
    expect(verifyFarkasRay(boxed, Float64Array.of(2, -1)).isProof).toBe(false);
  });

  it('lets noise of cancellation pass on a bound that is not there, since no plan reaches that far', () => {
    // 0.1 + 0.2 is not 0.3 in doubles: g_a = 5.6e-17 · 10, on a column without an upper bound.
    const decimals = lp(`
      minimise a
      first: 0.1 a + b >= 5
      second: 0.2 a + b >= 5
      both: 0.3 a + 2 b <= 8`);
    const y = Float64Array.of(1, 1, -1);
    expect(0.1 + 0.2 - 0.3).not.toBe(0);
    expect(verifyFarkasRay(decimals, y)).toEqual({ isProof: true });
  });

  it('refuses what is small but no noise: the problem is feasible with a large amount', () => {
    // By hand: a = 4e9, b = 0 … orders: 1.0000000005 · 4e9 − 4e9 = 2 ≥ 2: feasible, though y nearly cancels.
    const far = lp(`
      minimise a
      orders: 1.0000000005 a + b >= 2
      kiln: a + b <= 0
      b free`);
    expect(verifyFarkasRay(far, Float64Array.of(1, -1)).isProof).toBe(false);
  });

  it('refuses a margin that is nothing but rounding', () => {
    const touching = lp(`
      minimise a
      orders: a >= 0.3
      kiln: a <= 0.3`);
    expect(verifyFarkasRay(touching, Float64Array.of(1, -1)).isProof).toBe(false);
  });

  it('proves by column bounds alone', () => {
    const capped = lp(`
      minimise a
      orders: a + b >= 10
      a <= 4
      b <= 5`);
    expect(verifyFarkasRay(capped, Float64Array.of(1))).toEqual({ isProof: true });
  });
});

describe('SC-23 verifyUnboundedRay', () => {
  const open = lp(`
    maximise a + b
    balance: a - b <= 1
    level: a - b >= -1`);
  const point = Float64Array.of(0, 0);

  it('accepts a point and a ray, at any scale', () => {
    for (const scale of [1, 1e-12, 1e12]) {
      expect(verifyUnboundedRay(open, point, Float64Array.of(scale, scale))).toEqual({ isProof: true });
    }
  });

  it('refuses a point outside, a ray into a bound, and a ray along which nothing improves', () => {
    expect(verifyUnboundedRay(open, Float64Array.of(3, 0), Float64Array.of(1, 1)).isProof).toBe(false);
    expect(verifyUnboundedRay(open, point, Float64Array.of(1, 0.9999)).isProof).toBe(false);
    expect(verifyUnboundedRay(open, point, Float64Array.of(-1, -1)).isProof).toBe(false);
    expect(verifyUnboundedRay(open, point, Float64Array.of(0, 0)).isProof).toBe(false);
    expect(verifyUnboundedRay(open, point, Float64Array.of(NaN, 1)).isProof).toBe(false);
    expect(
      verifyUnboundedRay({ ...open, cost: Float64Array.of(1, -1) }, point, Float64Array.of(1, 1)).isProof,
    ).toBe(false);
  });

  it('wants column components exactly right, which the giver can see to', () => {
    const three = lp(`
      maximise a + b
      balance: a - b <= 1
      level: a - b + c >= -1
      c <= 9`);
    const ray = Float64Array.of(1, 1, 1e-17);
    expect(verifyUnboundedRay(three, Float64Array.of(0, 0, 0), ray).isProof).toBe(false);
    expect(verifyUnboundedRay(three, Float64Array.of(0, 0, 0), withoutBlockedComponents(three, ray))).toEqual(
      { isProof: true },
    );
  });
});

describe('rays of HiGHS', () => {
  it('pass once they are cleaned, and fail with the sign turned, seeds 4000 to 4399', async () => {
    const highs = await loadHighsOnce();
    const seen = { farkas: 0, unbounded: 0 };
    for (let seed = 4000; seed < 4400; seed++) {
      const problem = randomLinearProgram(seed, randomKinds[seed % randomKinds.length]);
      const { farkasRay, unboundedRay, x } = solveWithHighs(highs, problem, { withRays: true });
      if (farkasRay !== undefined) {
        seen.farkas++;
        const verdicts = [farkasRay, farkasRay.map((y) => -y)].map(
          (y) => verifyFarkasRay(problem, withoutForbiddenComponents(problem, y)).isProof,
        );
        expect({ seed, proofs: verdicts.filter(Boolean).length }).toEqual({ seed, proofs: 1 });
      }
      if (unboundedRay !== undefined) {
        seen.unbounded++;
        expect({
          seed,
          verdict: verifyUnboundedRay(problem, x, withoutBlockedComponents(problem, unboundedRay)),
        }).toEqual({ seed, verdict: { isProof: true } });
        expect(
          verifyUnboundedRay(
            problem,
            x,
            unboundedRay.map((v) => -v),
          ).isProof,
        ).toBe(false);
      }
    }
    expect(seen.farkas).toBeGreaterThan(10);
    expect(seen.unbounded).toBeGreaterThan(50);
  });
});
