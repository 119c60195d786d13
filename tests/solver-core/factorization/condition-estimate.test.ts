/**
 * Estimates beside inverses that are exact: by hand, by a closed form, or by elimination in fractions of whole
 * numbers.
 */
import { BasisFactorization } from '../../../solver-core/factorization/basis-factorization';
import {
  estimateCondition,
  type ConditionEstimate,
} from '../../../solver-core/factorization/condition-estimate';
import { SeededRandom } from '../../../solver-core/numerics/seeded-random';
import { ScatteredVector } from '../../../solver-core/sparse/scattered-vector';
import type { SparseMatrix } from '../../../solver-core/sparse/sparse-matrix';
import { TripletBuilder } from '../../../solver-core/sparse/triplet-builder';
import { toNumber, type Fraction } from '../../oracles/exact-tableau-simplex';

type Rows = readonly (readonly number[])[];

function sparse(rows: Rows): SparseMatrix {
  const builder = new TripletBuilder();
  rows.forEach((row, i) => row.forEach((value, j) => value !== 0 && builder.add(i, j, value)));
  return builder.build(rows.length, rows[0]?.length ?? 0);
}

function estimateOf(matrix: SparseMatrix, basic: Int32Array): ConditionEstimate {
  const factorization = new BasisFactorization(matrix);
  expect(factorization.factorize(basic).rejectedVariables).toHaveLength(0);
  return estimateCondition(factorization, matrix, basic);
}

const allColumns = (rows: Rows): Int32Array => Int32Array.from(rows, (_, k) => k);

/** ‖B⁻¹‖₁ by Gauss–Jordan elimination in whole numbers over a common denominator (Edmonds); undefined when singular. */
function exactInverseNorm(rows: Rows): number | undefined {
  const m = rows.length;
  const table = rows.map((row, i) => [
    ...row.map((value) => BigInt(value)),
    ...row.map((_, j) => (i === j ? 1n : 0n)),
  ]);
  let denominator = 1n;
  for (let k = 0; k < m; k++) {
    const at = table.findIndex((row, i) => i >= k && row[k] !== 0n);
    if (at < 0) return undefined;
    [table[k], table[at]] = [table[at], table[k]];
    const [line, pivot] = [table[k], table[k][k]];
    table.forEach((row, i) => {
      if (i !== k) table[i] = row.map((entry, j) => (entry * pivot - row[k] * line[j]) / denominator);
    });
    denominator = pivot;
  }
  const size = (value: bigint): bigint => (value < 0n ? -value : value);
  // After elimination every row's diagonal is the last pivot.
  const sums = Array.from({ length: m }, (_, j) => table.reduce((sum, row) => sum + size(row[m + j]), 0n));
  const largest = sums.reduce((a, b) => (a > b ? a : b));
  const exact: Fraction = { numerator: largest, denominator: size(denominator) };
  return toNumber(exact);
}

describe('the estimate of the condition of a basis', () => {
  it('is exact for diagonal and triangular matrices that are inverted by hand', () => {
    const diagonal = [
      [4, 0, 0],
      [0, 0.5, 0],
      [0, 0, 2],
    ];
    expect(estimateOf(sparse(diagonal), allColumns(diagonal))).toEqual({
      norm: 4,
      inverseNorm: 2,
      condition: 8,
    });
    // Inverse by hand: [[1, 2, 10], [0, 1, 4], [0, 0, 1]], column sums 1, 3, 15; of the matrix 1, 3, 7.
    const triangular = [
      [1, -2, -2],
      [0, 1, -4],
      [0, 0, 1],
    ];
    expect(estimateOf(sparse(triangular), allColumns(triangular))).toEqual({
      norm: 7,
      inverseNorm: 15,
      condition: 105,
    });
  });

  it('takes a logical for the column −1 in its row', () => {
    // Column 2 and the logicals of rows 0 and 2: B = [[−1, 30, 0], [0, 5, 0], [0, 70, −1]].
    const matrix = sparse([
      [1, 2, 30],
      [0, 1, 5],
      [2, 0, 70],
    ]);
    // By hand B⁻¹ has the columns (−1, 0, 0), (6, 1/5, 14), (0, 0, −1): the largest sum is 20.2.
    const { norm, inverseNorm, condition } = estimateOf(matrix, Int32Array.of(3, 2, 5));
    expect(norm).toBe(105);
    expect(inverseNorm).toBeCloseTo(20.2, 13);
    expect(condition).toBeCloseTo(2121, 10);
  });

  it('is that of the identity for a basis of logicals, and 1 for a basis of no rows', () => {
    const matrix = sparse([
      [1, 2],
      [3, 4],
    ]);
    expect(estimateOf(matrix, Int32Array.of(2, 3))).toEqual({ norm: 1, inverseNorm: 1, condition: 1 });
    const empty = new TripletBuilder().build(0, 2);
    expect(estimateOf(empty, new Int32Array(0)).condition).toBe(1);
    expect(estimateOf(sparse([[-8]]), Int32Array.of(0))).toEqual({
      norm: 8,
      inverseNorm: 0.125,
      condition: 1,
    });
  });

  it('finds the known condition of Hilbert matrices, whose inverses are whole numbers', () => {
    // ‖H⁻¹‖₁ from the closed form of the inverse; κ₁ of orders 3 and 5: 748 and 943 656 (Higham 2002, §28.1, from
    // memory, and as the closed form gives them).
    for (const [order, known] of [
      [3, 748],
      [5, 943_656],
    ]) {
      const rows = Array.from({ length: order }, (_, i) =>
        Array.from({ length: order }, (__, j) => 1 / (i + j + 1)),
      );
      expect(estimateOf(sparse(rows), allColumns(rows)).condition / known).toBeCloseTo(1, 6);
    }
  });

  it('grows without bound as two columns grow parallel', () => {
    // B = [[1, 1], [1, 1 + ε]]: by hand ‖B‖₁ = 2 + ε, ‖B⁻¹‖₁ = (2 + ε) / ε.
    for (const epsilon of [2 ** -10, 2 ** -20, 2 ** -30]) {
      const rows = [
        [1, 1],
        [1, 1 + epsilon],
      ];
      const { condition } = estimateOf(sparse(rows), allColumns(rows));
      expect((condition * epsilon) / (2 + epsilon) ** 2).toBeCloseTo(1, 5);
    }
  });

  it('never exceeds the exact norm of the inverse and is mostly the norm itself, seeds 1 to 400', () => {
    let [tried, exactlyMet, far] = [0, 0, 0];
    for (let seed = 1; seed <= 400; seed++) {
      const random = new SeededRandom(seed);
      const order = random.nextInteger(2, 14);
      const density = random.pick([0.25, 0.5, 1]);
      const rows = Array.from({ length: order }, (_, i) =>
        Array.from({ length: order }, (__, j) =>
          random.next() < density || i === j ? random.nextInteger(-9, 9) : 0,
        ),
      );
      const exact = exactInverseNorm(rows);
      if (exact === undefined) continue;
      tried++;
      const { inverseNorm } = estimateOf(sparse(rows), allColumns(rows));
      expect({ seed, isBelow: inverseNorm <= exact * (1 + 1e-9) }).toEqual({ seed, isBelow: true });
      expect({ seed, isInSize: inverseNorm >= exact / 10 }).toEqual({ seed, isInSize: true });
      if (inverseNorm < exact / 3) far++;
      if (inverseNorm >= exact * (1 - 1e-9)) exactlyMet++;
    }
    expect(tried).toBeGreaterThan(300);
    expect(far).toBeLessThanOrEqual(tried / 100);
    // Higham (1988), §5, finds the exact value in most of his random cases.
    expect(exactlyMet).toBeGreaterThan(0.7 * tried);
  });

  it('speaks of the basis after updates, and keeps what the next update needs', () => {
    const random = new SeededRandom(9);
    const rows = Array.from({ length: 10 }, () =>
      Array.from({ length: 10 }, () => (random.next() < 0.6 ? random.nextInteger(-9, 9) : 0)),
    );
    const matrix = sparse(rows);
    const factorization = new BasisFactorization(matrix);
    const basic = Int32Array.from(rows, (_, row) => 10 + row);
    factorization.factorize(basic);
    const left = new Set(rows.keys());
    for (let entering = 0; entering < 10; entering++) {
      const column = new ScatteredVector(10);
      rows.forEach((row, i) => (column.value[i] = row[entering]));
      column.relist(0);
      factorization.ftran(column, 'entering column');
      const position = [...left].reduce((a, b) =>
        Math.abs(column.value[b]) > Math.abs(column.value[a]) ? b : a,
      );
      left.delete(position);
      const unit = new ScatteredVector(10);
      unit.value[position] = 1;
      unit.index[0] = position;
      unit.count = 1;
      factorization.btran(unit, 'tableau row');
      // Between the solves of an iteration and its update.
      estimateCondition(factorization, matrix, basic);
      expect(factorization.update(position, column.value[position])).toBe('updated');
      basic[position] = entering;
      const updated = estimateCondition(factorization, matrix, basic);
      const fresh = estimateOf(matrix, Int32Array.from(basic));
      expect(updated.norm).toBe(fresh.norm);
      expect(updated.inverseNorm / fresh.inverseNorm).toBeCloseTo(1, 6);
    }
    expect(factorization.updateCount).toBe(10);
    const exact = exactInverseNorm(rows)!;
    expect(estimateCondition(factorization, matrix, basic).inverseNorm / exact).toBeCloseTo(1, 6);
  });

  it('is compared with a reference that inverts as one does by hand', () => {
    expect(
      exactInverseNorm([
        [2, 1],
        [1, 1],
      ]),
    ).toBe(3); // by hand: [[1, −1], [−1, 2]]
  });
});
