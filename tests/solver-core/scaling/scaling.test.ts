import { geometricScaling } from '../../../solver-core/scaling/geometric-scaling';
import { ScaledLinearProgram } from '../../../solver-core/scaling/scaled-linear-program';
import { binaryExponent, nearestPowerOfTwo, powerOfTwo } from '../../../solver-core/numerics/power-of-two';
import { lp } from '../../support/lp-notation';

describe('powers of two', () => {
  test.each([
    [1, 0],
    [-1.5, 0],
    [0.75, -1],
    [1024, 10],
    [1e-300, -997],
  ])('binaryExponent(%p) is %p', (value, exponent) => {
    expect(binaryExponent(value)).toBe(exponent);
  });

  test.each([-1022, -3, 0, 1, 700, 1023])('powerOfTwo(%p) is exact', (exponent) => {
    expect(powerOfTwo(exponent)).toBe(2 ** exponent);
  });

  test('the nearest power on the logarithmic scale: √2 is the watershed', () => {
    expect(nearestPowerOfTwo(1.41)).toBe(1);
    expect(nearestPowerOfTwo(1.42)).toBe(2);
    expect(nearestPowerOfTwo(3)).toBe(4);
    expect(nearestPowerOfTwo(0.3)).toBe(0.25);
  });
});

const wellScaled = lp(`
  maximise 3 plates + 4 bowls
  press: 2 plates + bowls <= 40
  kiln: plates + 3 bowls <= 60
`);

const badlyScaled = lp(`
  maximise 0.00002 dust + 30000 pallets
  press: 0.0001 dust + 20000 pallets <= 400
  kiln: 0.004 dust + 3000 pallets >= 20
  10 <= dust <= 1000000
`);

test('a well-scaled matrix is left alone', () => {
  expect(geometricScaling(wellScaled.matrix)).toBeUndefined();
  expect(ScaledLinearProgram.of(wellScaled).problem).toBe(wellScaled);
});

test('every factor is a power of two and magnitudes come near 1', () => {
  const factors = geometricScaling(badlyScaled.matrix)!;
  for (const factor of [...factors.row, ...factors.column]) expect(nearestPowerOfTwo(factor)).toBe(factor);
  const scaled = ScaledLinearProgram.of(badlyScaled).problem;
  const spread = (values: Iterable<number>): number => {
    const sizes = [...values].map(Math.abs);
    return Math.max(...sizes) / Math.min(...sizes);
  };
  expect(spread(badlyScaled.matrix.value)).toBeGreaterThan(1e8);
  expect(spread(scaled.matrix.value)).toBeLessThan(100);
});

test('bounds survive the way there and back to the last bit', () => {
  const scaled = ScaledLinearProgram.of(badlyScaled);
  for (let column = 0; column < badlyScaled.columnCount; column++) {
    expect(scaled.statedValue(column, scaled.problem.columnLower[column])).toBe(
      badlyScaled.columnLower[column],
    );
    expect(scaled.statedValue(column, scaled.problem.columnUpper[column])).toBe(
      badlyScaled.columnUpper[column],
    );
  }
});
