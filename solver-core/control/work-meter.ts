/**
 * Deterministic work units: what stands for time in a core without a clock. One unit is about one nonzero handled in an
 * inner loop. A million units took 5 to 10 ms in a warm process (benchmarks, Netlib), far longer in its first moments:
 * callers who slice by time must measure as they go.
 */
export class WorkMeter {
  private used = 0;
  private sliceEnd = 0;

  constructor(
    /** Units after which the whole solve stops; Infinity for none. */
    readonly limit: number,
  ) {}

  get total(): number {
    return this.used;
  }

  /** Opens the next slice of work. */
  grant(units: number): void {
    this.sliceEnd = this.used + units;
  }

  spend(units: number): void {
    this.used += units;
  }

  /** The slice is spent: give control back to the caller. */
  get isSliceSpent(): boolean {
    return this.used >= this.sliceEnd;
  }

  /** The solve's limit is reached. */
  get isLimitReached(): boolean {
    return this.used >= this.limit;
  }
}
