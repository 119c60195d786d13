/**
 * Sums and dot products as if computed in twice the working precision: for every number that decides something
 * (feasibility, objective, residual), so that what is judged is the point and not the judge's own rounding.
 *
 * Each sum is kept as an unevaluated pair high + low. Additions and products are split without error into a rounded
 * result and what the rounding lost; the losses are summed apart.
 *
 * Source: Neumaier (1974), "Rundungsfehleranalyse einiger Verfahren zur Summation endlicher Summen", algorithm IV;
 * Dekker (1971), "A floating-point technique for extending the available precision", for the product;
 * Ogita, Rump, Oishi (2005), "Accurate sum and dot product", algorithm Dot2.
 */

/** Splits a double into two halves of 26 bits: 2^27 + 1 (Dekker 1971). */
const splitter = 134217729;
/** Above this magnitude, 2^996, splitting would overflow; the product's error is then left out. */
const largestSplittable = 6.69692879491417e299;

/** What rounding lost in product = fl(a · b): a · b − product, exactly, as long as nothing over- or underflows. */
export function productError(a: number, b: number, product: number): number {
  if (!(Math.abs(a) < largestSplittable && Math.abs(b) < largestSplittable && Number.isFinite(product))) {
    return 0;
  }
  const spreadA = splitter * a;
  const highA = spreadA - (spreadA - a);
  const lowA = a - highA;
  const spreadB = splitter * b;
  const highB = spreadB - (spreadB - b);
  const lowB = b - highB;
  return lowA * lowB - (product - highA * highB - lowA * highB - highA * lowB);
}

/** One running sum. */
export class CompensatedSum {
  private high = 0;
  private low = 0;

  add(term: number): void {
    const sum = this.high + term;
    this.low += Math.abs(this.high) >= Math.abs(term) ? this.high - sum + term : term - sum + this.high;
    this.high = sum;
  }

  /** Adds a · b with the rounding of the product. */
  addProduct(a: number, b: number): void {
    const product = a * b;
    this.add(product);
    this.low += productError(a, b, product);
  }

  /** The sum, rounded once. Not finite where a term or a partial sum was not. */
  get value(): number {
    // An overflow leaves NaN in the compensation; the plain sum then tells which way it went.
    return Number.isFinite(this.high) ? this.high + this.low : this.high;
  }

  reset(): void {
    this.high = 0;
    this.low = 0;
  }
}

/** A vector of running sums: A · x gathered column by column needs one for every row. */
export class CompensatedSums {
  private readonly high: Float64Array;
  private readonly low: Float64Array;

  constructor(length: number) {
    this.high = new Float64Array(length);
    this.low = new Float64Array(length);
  }

  add(index: number, term: number): void {
    const before = this.high[index];
    const sum = before + term;
    this.low[index] += Math.abs(before) >= Math.abs(term) ? before - sum + term : term - sum + before;
    this.high[index] = sum;
  }

  addProduct(index: number, a: number, b: number): void {
    const product = a * b;
    this.add(index, product);
    this.low[index] += productError(a, b, product);
  }

  valueAt(index: number): number {
    const high = this.high[index];
    return Number.isFinite(high) ? high + this.low[index] : high;
  }

  /** Each sum, rounded once. */
  values(): Float64Array {
    return Float64Array.from(this.high, (_, index) => this.valueAt(index));
  }
}
