import { CompensatedSum, CompensatedSums, productError } from '../../../solver-core/numerics/compensated-sum';
import { SeededRandom } from '../../../solver-core/numerics/seeded-random';
import { fromNumber } from '../../oracles/exact-tableau-simplex';

/** Σ a·b, exactly, by whole numbers without end, rounded to a double. */
function exactDot(a: readonly number[], b: readonly number[]): number {
  const scale = 1n << 300n;
  const total = a.reduce((sum, value, k) => {
    const x = fromNumber(value);
    const y = fromNumber(b[k]);
    return sum + (x.numerator * y.numerator * scale) / (x.denominator * y.denominator);
  }, 0n);
  return Number(total) / Number(scale);
}

describe('CompensatedSum', () => {
  it('keeps a small term that plain addition would lose', () => {
    // By hand: (10^16 + 1) − 10^16 = 1; plain addition gives 0.
    const sum = new CompensatedSum();
    [1e16, 1, -1e16].forEach((term) => sum.add(term));
    expect(sum.value).toBe(1);
    expect(1e16 + 1 - 1e16).toBe(0);
  });

  it('keeps what the product of two doubles loses', () => {
    // By hand: (1 + 2^−30)² = 1 + 2^−29 + 2^−60, of which the last does not fit into a double beside 1.
    const a = 1 + 2 ** -30;
    expect(productError(a, a, a * a)).toBe(2 ** -60);
  });

  it('gives a dot product with heavy cancellation to the last place or nearly so, seed 7', () => {
    const random = new SeededRandom(7);
    for (let round = 0; round < 50; round++) {
      const a: number[] = [];
      const b: number[] = [];
      for (let k = 0; k < 40; k++) {
        const x = (random.next() - 0.5) * 2 ** random.nextInteger(-10, 10);
        const y = (random.next() - 0.5) * 2 ** random.nextInteger(-10, 10);
        a.push(x, -x * (1 + 2 ** -40));
        b.push(y, y);
      }
      const sum = new CompensatedSum();
      a.forEach((value, k) => sum.addProduct(value, b[k]));
      const exact = exactDot(a, b);
      expect(Math.abs(sum.value - exact)).toBeLessThanOrEqual(4 * Number.EPSILON * Math.abs(exact));
    }
  });

  it('tells infinity and not-a-number as they are', () => {
    const overflow = new CompensatedSum();
    [1e308, 1e308, -1].forEach((term) => overflow.add(term));
    expect(overflow.value).toBe(Infinity);
    const notANumber = new CompensatedSum();
    notANumber.addProduct(NaN, 1);
    expect(notANumber.value).toBeNaN();
    const large = new CompensatedSum();
    large.addProduct(1e305, 1e-5);
    expect(large.value).toBeCloseTo(1e300, -286);
  });

  it('starts anew after reset', () => {
    const sum = new CompensatedSum();
    sum.addProduct(0.1, 0.1);
    sum.reset();
    sum.add(2);
    expect(sum.value).toBe(2);
  });
});

describe('CompensatedSums', () => {
  it('keeps a sum for every place, each like CompensatedSum', () => {
    const sums = new CompensatedSums(2);
    [1e16, 1, -1e16].forEach((term) => sums.add(1, term));
    sums.addProduct(0, 3, 4);
    expect(Array.from(sums.values())).toEqual([12, 1]);
  });
});
