import { messageTarget, RangeQueue, splitRange } from '../../../../addin/adapters/excel-host/excel-chunking';
import { cellCountOf, rangesOverlap, type CellRange } from '../../../../addin/domain/sheet/cell-range';

const range = (top: number, left: number, bottom: number, right: number): CellRange => ({
  sheet: 'Plan',
  top,
  left,
  bottom,
  right,
});

/** Linear congruential generator; constants after Numerical Recipes (from memory). */
function randomFrom(seed: number): (below: number) => number {
  let state = seed;
  return (below) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return Math.floor((state / 2 ** 32) * below);
  };
}

it('a range that fits stays whole; otherwise whole rows are cut off, and rows only where not one fits', () => {
  expect(splitRange(range(0, 0, 9, 9), 100)).toEqual([range(0, 0, 9, 9)]);
  expect(splitRange(range(0, 0, 9, 9), 35)).toEqual([range(0, 0, 2, 9), range(3, 0, 9, 9)]);
  expect(splitRange(range(0, 0, 9, 9), 4)).toEqual([range(0, 0, 0, 3), range(0, 4, 0, 9), range(1, 0, 9, 9)]);
  expect(splitRange(range(3, 3, 3, 3), 0)).toEqual([range(3, 3, 3, 3)]);
});

it.each([1, 2, 3])('every cell is given out once, in messages of the right size (seed %i)', (seed) => {
  const random = randomFrom(seed);
  for (let round = 0; round < 30; round++) {
    const ranges = Array.from({ length: 1 + random(4) }, (_, position) => {
      const top = position * 1000;
      return range(top, random(5), top + random(400), 5 + random(60));
    });
    const bytesPerCell = 200 + random(20_000);
    const queue = new RangeQueue(ranges, bytesPerCell);
    const given: CellRange[] = [];
    while (!queue.isEmpty) {
      const taken = queue.take();
      expect(taken.length).toBeGreaterThan(0);
      const cells = taken.reduce((sum, part) => sum + cellCountOf(part), 0);
      expect(cells * bytesPerCell).toBeLessThanOrEqual(Math.max(messageTarget, bytesPerCell));
      given.push(...taken);
    }
    const total = ranges.reduce((sum, part) => sum + cellCountOf(part), 0);
    expect(given.reduce((sum, part) => sum + cellCountOf(part), 0)).toBe(total);
    for (const [position, part] of given.entries()) {
      expect(given.slice(position + 1).some((other) => rangesOverlap(part, other))).toBe(false);
    }
  }
});

it('what came back tells how large the next message may be', () => {
  const queue = new RangeQueue([range(0, 0, 99_999, 9)]);
  const [first] = queue.take();
  const rows = Array.from({ length: first.bottom + 1 }, () =>
    Array.from({ length: 10 }, () => 'x'.repeat(397)),
  );
  // 400 bytes a cell: 10,000 cells a message.
  queue.learn([[rows]]);
  const [second] = queue.take();
  expect(cellCountOf(second)).toBeGreaterThan(9_000);
  expect(cellCountOf(second)).toBeLessThan(11_000);
});

it('what was too large comes again in smaller pieces, down to one cell', () => {
  const queue = new RangeQueue([range(0, 0, 99, 9)]);
  let taken = queue.take();
  for (let round = 0; cellCountOf(taken[0]) > 1; round++) {
    const before = cellCountOf(taken[0]);
    queue.putBack(taken);
    taken = queue.take();
    expect(cellCountOf(taken[0])).toBeLessThan(before);
    expect(round).toBeLessThan(20);
  }
});

it('a message without room takes nothing', () => {
  const queue = new RangeQueue([range(0, 0, 1, 1)]);
  expect(queue.take(0)).toEqual([]);
  expect(queue.take(-5)).toEqual([]);
  expect(queue.isEmpty).toBe(false);
});
