/**
 * A vector as dense values with a list of the places that may hold a nonzero.
 *
 * While `isListed`, every place outside `index[0 … count − 1]` holds 0. When the list would be long it is given up
 * (`count = −1`) and readers go over the whole array: going over a list is dearer per entry than over an array.
 */
export class ScatteredVector {
  /** Length as constructed; the vector's values. */
  readonly value: Float64Array;
  /** Places that may be nonzero, in no order; only the first `count` are valid. */
  readonly index: Int32Array;
  /** How many places are listed; −1 when the list was given up. */
  count = 0;

  constructor(readonly length: number) {
    this.value = new Float64Array(length);
    this.index = new Int32Array(length);
  }

  get isListed(): boolean {
    return this.count >= 0;
  }

  /** Sets every entry to 0, in time of the list where there is one. */
  clear(): void {
    const { value, index, count } = this;
    if (count < 0 || count > this.length * 0.3) {
      value.fill(0);
    } else {
      for (let k = 0; k < count; k++) value[index[k]] = 0;
    }
    this.count = 0;
  }

  /** Makes the list from the values: only true nonzeros, places ascending; entries below `drop` become 0. */
  relist(drop: number): void {
    const { value, index, length } = this;
    let count = 0;
    for (let k = 0; k < length; k++) {
      const entry = value[k];
      if (entry === 0) continue;
      if (entry < drop && entry > -drop) value[k] = 0;
      else index[count++] = k;
    }
    this.count = count;
  }

  copyFrom(other: ScatteredVector): void {
    this.clear();
    if (other.count < 0) {
      this.value.set(other.value);
      this.count = -1;
      return;
    }
    const { value, index } = this;
    for (let k = 0; k < other.count; k++) {
      const place = other.index[k];
      index[k] = place;
      value[place] = other.value[place];
    }
    this.count = other.count;
  }
}
