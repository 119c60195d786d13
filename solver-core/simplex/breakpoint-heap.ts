/**
 * A binary heap of breakpoints, least step first; ties broken by the number of the variable, so that the order is the
 * same on every machine. Shared by the two ratio tests that pass over bounds.
 */
export class BreakpointHeap {
  private readonly item: Int32Array;
  /** Step of each item, by item number (not by place in the heap). */
  readonly step: Float64Array;
  private size = 0;

  constructor(itemCount: number) {
    this.item = new Int32Array(itemCount);
    this.step = new Float64Array(itemCount);
  }

  get count(): number {
    return this.size;
  }

  clear(): void {
    this.size = 0;
  }

  /** Adds without ordering; `order` must follow before the first `pop`. */
  push(item: number, step: number): void {
    this.item[this.size++] = item;
    this.step[item] = step;
  }

  order(): void {
    for (let place = (this.size >> 1) - 1; place >= 0; place--) this.sink(place);
  }

  /** Step of the least breakpoint; Infinity when there is none. */
  get leastStep(): number {
    return this.size > 0 ? this.step[this.item[0]] : Infinity;
  }

  pop(): number {
    const top = this.item[0];
    this.item[0] = this.item[--this.size];
    this.sink(0);
    return top;
  }

  private sink(from: number): void {
    const { item, step, size } = this;
    const moving = item[from];
    const movingStep = step[moving];
    let place = from;
    for (;;) {
      let child = 2 * place + 1;
      if (child >= size) break;
      let childStep = step[item[child]];
      if (child + 1 < size) {
        const otherStep = step[item[child + 1]];
        if (otherStep < childStep || (otherStep === childStep && item[child + 1] < item[child])) {
          child++;
          childStep = otherStep;
        }
      }
      if (childStep > movingStep || (childStep === movingStep && item[child] > moving)) break;
      item[place] = item[child];
      place = child;
    }
    item[place] = moving;
  }
}
