/**
 * Rows or columns that wait to be looked at, each at most once, first come first served.
 */
export class ChangeQueue {
  /** A ring of as many places as there are numbers: none can wait twice. */
  private readonly waiting: Int32Array;
  private readonly isWaiting: Uint8Array;
  private first = 0;
  private count = 0;

  private constructor(private readonly size: number) {
    this.waiting = new Int32Array(size);
    this.isWaiting = new Uint8Array(size);
  }

  /** All of 0 … size − 1, in order. */
  static ofAll(size: number): ChangeQueue {
    const queue = new ChangeQueue(size);
    for (let number = 0; number < size; number++) queue.add(number);
    return queue;
  }

  add(number: number): void {
    if (this.isWaiting[number] === 1) return;
    this.isWaiting[number] = 1;
    let at = this.first + this.count++;
    if (at >= this.size) at -= this.size;
    this.waiting[at] = number;
  }

  /** The next one, or undefined when none waits. */
  take(): number | undefined {
    if (this.count === 0) return undefined;
    const number = this.waiting[this.first];
    this.count--;
    if (++this.first === this.size) this.first = 0;
    this.isWaiting[number] = 0;
    return number;
  }
}
