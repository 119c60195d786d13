/**
 * The one pseudo-random generator: the same seed gives the same numbers on every machine.
 *
 * Source: Blackman and Vigna (2021), "Scrambled linear pseudorandom number generators", xoshiro128**; its state is
 * filled from the seed by the 32-bit finaliser of MurmurHash3 (Appleby) over a Weyl sequence, as its authors advise.
 */
export class SeededRandom {
  private readonly state = new Uint32Array(4);

  constructor(seed: number) {
    let weyl = seed >>> 0;
    for (let word = 0; word < 4; word++) {
      weyl = (weyl + 0x9e3779b9) >>> 0;
      let mixed = Math.imul(weyl ^ (weyl >>> 16), 0x85ebca6b);
      mixed = Math.imul(mixed ^ (mixed >>> 13), 0xc2b2ae35);
      this.state[word] = mixed ^ (mixed >>> 16);
    }
    // The all-zero state would stay there for ever; no Weyl step can yield it four times in a row.
  }

  /** A whole number from 0 to 2^32 − 1. */
  nextUint32(): number {
    const s = this.state;
    const scrambled = Math.imul(rotateLeft(Math.imul(s[1], 5), 7), 9) >>> 0;
    const shifted = s[1] << 9;
    s[2] ^= s[0];
    s[3] ^= s[1];
    s[1] ^= s[2];
    s[0] ^= s[3];
    s[2] ^= shifted;
    s[3] = rotateLeft(s[3], 11);
    return scrambled;
  }

  /** A number in [0, 1), a multiple of 2^−32. */
  next(): number {
    return this.nextUint32() / 4294967296;
  }

  /** A whole number from `least` to `greatest`, both included; the slight bias of scaling is of no concern here. */
  nextInteger(least: number, greatest: number): number {
    return least + Math.floor(this.next() * (greatest - least + 1));
  }

  /** One of the choices. */
  pick<T>(choices: readonly T[]): T {
    return choices[this.nextInteger(0, choices.length - 1)];
  }
}

function rotateLeft(word: number, by: number): number {
  return (word << by) | (word >>> (32 - by));
}
