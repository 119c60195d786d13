import { BasisFactorization } from '../../../solver-core/factorization/basis-factorization';
import { SeededRandom } from '../../../solver-core/numerics/seeded-random';
import { ScatteredVector } from '../../../solver-core/sparse/scattered-vector';
import type { SparseMatrix } from '../../../solver-core/sparse/sparse-matrix';
import { TripletBuilder } from '../../../solver-core/sparse/triplet-builder';

function randomMatrix(random: SeededRandom, rows: number, columns: number, perColumn: number): SparseMatrix {
  const builder = new TripletBuilder();
  for (let column = 0; column < columns; column++) {
    const count = 1 + Math.floor(random.next() * perColumn);
    for (let k = 0; k < count; k++) {
      builder.add(Math.floor(random.next() * rows), column, Math.round((random.next() - 0.5) * 20) || 1);
    }
  }
  return builder.build(rows, columns);
}

/** Column of [A | −I], dense. */
function columnOf(matrix: SparseMatrix, variable: number): Float64Array {
  const dense = new Float64Array(matrix.rowCount);
  if (variable >= matrix.columnCount) dense[variable - matrix.columnCount] = -1;
  else {
    for (let at = matrix.columnStart[variable]; at < matrix.columnStart[variable + 1]; at++) {
      dense[matrix.rowIndex[at]] = matrix.value[at];
    }
  }
  return dense;
}

/** Largest |B x − right| over rows, computed from the columns themselves. */
function columnResidual(
  matrix: SparseMatrix,
  basic: Int32Array,
  x: Float64Array,
  right: Float64Array,
): number {
  const product = new Float64Array(matrix.rowCount);
  basic.forEach((variable, position) => {
    columnOf(matrix, variable).forEach((entry, row) => (product[row] += entry * x[position]));
  });
  return Math.max(0, ...product.map((value, row) => Math.abs(value - right[row])));
}

/** Largest |Bᵀ y − right| over positions. */
function rowResidual(matrix: SparseMatrix, basic: Int32Array, y: Float64Array, right: Float64Array): number {
  return Math.max(
    0,
    ...Array.from(basic, (variable, position) => {
      const dot = columnOf(matrix, variable).reduce((sum, entry, row) => sum + entry * y[row], 0);
      return Math.abs(dot - right[position]);
    }),
  );
}

function scattered(values: Float64Array): ScatteredVector {
  const vector = new ScatteredVector(values.length);
  vector.value.set(values);
  vector.count = -1;
  vector.relist(0);
  return vector;
}

function randomRight(random: SeededRandom, length: number, isSparse: boolean): Float64Array {
  const right = new Float64Array(length);
  if (isSparse) right[Math.floor(random.next() * length)] = 1 + random.next();
  else right.forEach((_, k) => (right[k] = random.next() - 0.5));
  return right;
}

const sizes = [
  { rows: 1, perColumn: 1 },
  { rows: 7, perColumn: 3 },
  { rows: 40, perColumn: 4 },
  { rows: 120, perColumn: 3 }, // long and thin enough for the hyper-sparse solves
  { rows: 60, perColumn: 25 },
];

describe.each(sizes)(
  'a basis of order $rows with up to $perColumn entries a column, seed 5',
  ({ rows, perColumn }) => {
    test('ftran and btran solve with the fresh factors', () => {
      const random = new SeededRandom(5);
      for (let round = 0; round < 8; round++) {
        const matrix = randomMatrix(random, rows, 2 * rows, perColumn);
        const factorization = new BasisFactorization(matrix);
        const basic = Int32Array.from({ length: rows }, (_, k) => Math.floor(2 * k + 2 * random.next()));
        const before = new Set(basic);
        const outcome = factorization.factorize(basic);
        expect(outcome.rejectedVariables).toHaveLength(outcome.replacedRows.length);
        for (const variable of basic) {
          const isReplacement = outcome.replacedRows.includes(variable - matrix.columnCount);
          expect(before.has(variable) || isReplacement).toBe(true);
        }
        for (const isSparse of [true, false]) {
          const right = randomRight(random, rows, isSparse);
          const x = scattered(right);
          factorization.ftran(x);
          const size = 1 + Math.max(...x.value.map(Math.abs));
          expect(columnResidual(matrix, basic, x.value, right)).toBeLessThan(1e-10 * size);
          const y = scattered(right);
          factorization.btran(y);
          expect(rowResidual(matrix, basic, y.value, right)).toBeLessThan(
            1e-10 * (1 + Math.max(...y.value.map(Math.abs))),
          );
        }
      }
    });

    test('they still solve after up to 60 updates, and a list names every nonzero', () => {
      const random = new SeededRandom(17);
      const matrix = randomMatrix(random, rows, 3 * rows, perColumn);
      const factorization = new BasisFactorization(matrix);
      const basic = Int32Array.from({ length: rows }, (_, row) => matrix.columnCount + row);
      factorization.factorize(basic);
      let updates = 0;
      for (let attempt = 0; attempt < 400 && updates < 60; attempt++) {
        const entering = Math.floor(random.next() * (matrix.columnCount + rows));
        if (basic.includes(entering)) continue;
        const column = scattered(columnOf(matrix, entering));
        factorization.ftran(column, 'entering column');
        let position = -1;
        column.value.forEach((entry, at) => {
          if (Math.abs(entry) > 0.1 && (position < 0 || random.next() < 0.3)) position = at;
        });
        if (position < 0) continue;
        const unit = new Float64Array(rows);
        unit[position] = 1;
        const rho = scattered(unit);
        factorization.btran(rho, 'tableau row');
        expect(rowResidual(matrix, basic, rho.value, unit)).toBeLessThan(
          1e-8 * (1 + Math.max(...rho.value.map(Math.abs))),
        );
        const outcome = factorization.update(position, column.value[position]);
        basic[position] = entering;
        updates++;
        if (outcome === 'unstable') factorization.factorize(basic);
      }
      expect(updates).toBeGreaterThan(0);
      for (const isSparse of [true, false]) {
        const right = randomRight(random, rows, isSparse);
        const x = scattered(right);
        factorization.ftran(x);
        const listed = new Set(x.index.subarray(0, x.count));
        x.value.forEach((entry, at) => expect(entry === 0 || listed.has(at)).toBe(true));
        expect(columnResidual(matrix, basic, x.value, right)).toBeLessThan(
          1e-7 * (1 + Math.max(...x.value.map(Math.abs))),
        );
        const y = scattered(right);
        factorization.btran(y);
        expect(rowResidual(matrix, basic, y.value, right)).toBeLessThan(
          1e-7 * (1 + Math.max(...y.value.map(Math.abs))),
        );
      }
    });
  },
);

test('a singular basis is repaired with logicals and the rejected columns are named', () => {
  // Columns 0 and 1 are multiples of each other, column 2 is empty of anything new: rank 1 of 3.
  const builder = new TripletBuilder();
  for (const [column, factor] of [1, 2, -3].entries()) {
    builder.add(0, column, factor);
    builder.add(1, column, 2 * factor);
  }
  const matrix = builder.build(3, 3);
  const basic = Int32Array.of(0, 1, 2);
  const factorization = new BasisFactorization(matrix);
  const { rejectedVariables, replacedRows } = factorization.factorize(basic);
  expect(rejectedVariables).toHaveLength(2);
  expect(replacedRows).toHaveLength(2);
  expect(replacedRows).toContain(2); // no column has an entry there
  const right = Float64Array.of(1, 2, 3);
  const x = scattered(right);
  factorization.ftran(x);
  expect(columnResidual(matrix, basic, x.value, right)).toBeLessThan(1e-12);
});
