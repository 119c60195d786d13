import { SeededRandom } from '../../../solver-core/numerics/seeded-random';

/** xoshiro128** by its published definition, on whole numbers without end; state words as given. */
function* reference(state: readonly number[]): Generator<number> {
  const mask = (1n << 32n) - 1n;
  const s = state.map(BigInt);
  const rotate = (word: bigint, by: bigint): bigint => ((word << by) | (word >> (32n - by))) & mask;
  for (;;) {
    yield Number((rotate((s[1] * 5n) & mask, 7n) * 9n) & mask);
    const shifted = (s[1] << 9n) & mask;
    s[2] ^= s[0];
    s[3] ^= s[1];
    s[1] ^= s[2];
    s[0] ^= s[3];
    s[2] ^= shifted;
    s[3] = rotate(s[3], 11n);
  }
}

describe('SeededRandom', () => {
  it('steps as Blackman and Vigna define xoshiro128**', () => {
    const random = new SeededRandom(42);
    const expected = reference(Array.from((random as unknown as { state: Uint32Array }).state));
    for (let draw = 0; draw < 1000; draw++) {
      expect(random.nextUint32()).toBe(expected.next().value);
    }
  });

  it('gives the same numbers for the same seed and others for another', () => {
    const draw = (seed: number): number[] => {
      const random = new SeededRandom(seed);
      return Array.from({ length: 5 }, () => random.nextUint32());
    };
    expect(draw(1)).toEqual(draw(1));
    expect(draw(1)).not.toEqual(draw(2));
    expect(draw(0)).not.toEqual([0, 0, 0, 0, 0]);
  });

  it('spreads over its range, seed 3', () => {
    const random = new SeededRandom(3);
    const counts = new Array<number>(10).fill(0);
    for (let draw = 0; draw < 10000; draw++) {
      const unit = random.next();
      expect(unit >= 0 && unit < 1).toBe(true);
      counts[random.nextInteger(0, 9)]++;
    }
    // 1000 each; six standard deviations are 180.
    counts.forEach((count) => expect(Math.abs(count - 1000)).toBeLessThan(180));
  });
});
