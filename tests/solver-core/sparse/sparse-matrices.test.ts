import { BrokenInvariantError } from '../../../solver-core/control/solver-errors';
import { ScatteredVector } from '../../../solver-core/sparse/scattered-vector';
import { addProduct, columnDot } from '../../../solver-core/sparse/sparse-products';
import { transpose } from '../../../solver-core/sparse/transpose';
import { TripletBuilder } from '../../../solver-core/sparse/triplet-builder';
import { SeededRandom } from '../../../solver-core/numerics/seeded-random';

/** Worked by hand:  [0 2 0; 5 −2 0; 0 0 7]. */
function small() {
  const builder = new TripletBuilder();
  builder.add(2, 2, 7);
  builder.add(1, 1, -3);
  builder.add(0, 1, 2);
  builder.add(1, 0, 5);
  builder.add(1, 1, 1); // repeated place: summed to −2
  builder.add(0, 0, 4);
  builder.add(0, 0, -4); // cancels: dropped
  return builder.build(3, 3);
}

describe('TripletBuilder', () => {
  test('sums repeated places, drops what cancels and sorts every column by row', () => {
    const matrix = small();
    expect([...matrix.columnStart]).toEqual([0, 1, 3, 4]);
    expect([...matrix.rowIndex]).toEqual([1, 0, 1, 2]);
    expect([...matrix.value]).toEqual([5, 2, -2, 7]);
  });

  test('refuses an entry outside the matrix', () => {
    const builder = new TripletBuilder();
    builder.add(3, 0, 1);
    expect(() => builder.build(3, 3)).toThrow(BrokenInvariantError);
    const other = new TripletBuilder();
    other.add(0, 5, 1);
    expect(() => other.build(3, 3)).toThrow(BrokenInvariantError);
  });

  test('yields a matrix with no entries from no entries', () => {
    const matrix = new TripletBuilder().build(2, 3);
    expect([...matrix.columnStart]).toEqual([0, 0, 0, 0]);
    expect(matrix.value).toHaveLength(0);
  });
});

describe('transpose', () => {
  test('lists each row of the matrix in ascending order of columns', () => {
    const byRow = transpose(small());
    expect([byRow.rowCount, byRow.columnCount]).toEqual([3, 3]);
    expect([...byRow.columnStart]).toEqual([0, 1, 3, 4]);
    expect([...byRow.rowIndex]).toEqual([1, 0, 1, 2]);
    expect([...byRow.value]).toEqual([2, 5, -2, 7]);
  });

  test('is its own inverse on 50 random matrices, seed 11', () => {
    const random = new SeededRandom(11);
    for (let round = 0; round < 50; round++) {
      const rows = 1 + Math.floor(random.next() * 12);
      const columns = 1 + Math.floor(random.next() * 12);
      const builder = new TripletBuilder();
      for (let k = 0; k < 40; k++) {
        builder.add(
          Math.floor(random.next() * rows),
          Math.floor(random.next() * columns),
          random.next() - 0.5,
        );
      }
      const matrix = builder.build(rows, columns);
      expect(transpose(transpose(matrix))).toEqual(matrix);
    }
  });
});

describe('products', () => {
  test('addProduct adds factor × A x, columnDot gives one entry of Aᵀ y', () => {
    const result = Float64Array.of(1, 1, 1);
    addProduct(small(), Float64Array.of(1, 2, 3), 2, result);
    expect([...result]).toEqual([9, 3, 43]); // 1 + 2·(4, 1, 21), by hand
    expect(columnDot(small(), 1, Float64Array.of(10, 100, 1000))).toBe(-180);
  });
});

describe('ScatteredVector', () => {
  test('lists its true nonzeros and drops small ones', () => {
    const vector = new ScatteredVector(5);
    vector.value.set([0, 2, 1e-20, -3, 0]);
    vector.count = -1;
    expect(vector.isListed).toBe(false);
    vector.relist(1e-14);
    expect([...vector.index.subarray(0, vector.count)]).toEqual([1, 3]);
    expect([...vector.value]).toEqual([0, 2, 0, -3, 0]);
  });

  test('is all zero after clear, listed or not', () => {
    const vector = new ScatteredVector(4);
    vector.value[2] = 5;
    vector.index[0] = 2;
    vector.count = 1;
    vector.clear();
    expect([...vector.value]).toEqual([0, 0, 0, 0]);
    vector.value.fill(7);
    vector.count = -1;
    vector.clear();
    expect([...vector.value]).toEqual([0, 0, 0, 0]);
    expect(vector.count).toBe(0);
  });

  test('copies another with or without a list', () => {
    const from = new ScatteredVector(3);
    from.value[1] = 4;
    from.index[0] = 1;
    from.count = 1;
    const to = new ScatteredVector(3);
    to.value.fill(9);
    to.count = -1;
    to.copyFrom(from);
    expect([...to.value]).toEqual([0, 4, 0]);
    from.count = -1;
    to.copyFrom(from);
    expect(to.count).toBe(-1);
    expect([...to.value]).toEqual([0, 4, 0]);
  });
});
