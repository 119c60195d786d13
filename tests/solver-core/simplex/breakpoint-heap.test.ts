import { SeededRandom } from '../../../solver-core/numerics/seeded-random';
import { BreakpointHeap } from '../../../solver-core/simplex/breakpoint-heap';

test('breakpoints come out by step, ties by number (100 random heaps, seed 3)', () => {
  const random = new SeededRandom(3);
  for (let round = 0; round < 100; round++) {
    const count = 1 + Math.floor(random.next() * 40);
    const heap = new BreakpointHeap(count);
    const steps = Array.from({ length: count }, () => Math.floor(random.next() * 6));
    steps.forEach((step, item) => heap.push(item, step));
    heap.order();
    const expected = steps.map((_, item) => item).sort((a, b) => steps[a] - steps[b] || a - b);
    const popped: number[] = [];
    while (heap.count > 0) {
      expect(heap.leastStep).toBe(steps[expected[popped.length]]);
      popped.push(heap.pop());
    }
    expect(popped).toEqual(expected);
  }
});

test('an empty heap has no least step', () => {
  const heap = new BreakpointHeap(2);
  heap.push(1, 5);
  heap.clear();
  expect(heap.leastStep).toBe(Infinity);
});
