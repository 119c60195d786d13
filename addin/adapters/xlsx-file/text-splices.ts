/**
 * Changes to a text by place: what is not named stays to the character. Edited XML goes through here and is never
 * written anew from a tree.
 */

interface Splice {
  readonly start: number;
  readonly end: number;
  readonly replacement: string;
}

export class TextSplices {
  private readonly splices: Splice[] = [];

  constructor(private readonly text: string) {}

  /** Puts a text in place of [start, end) of the original. */
  replace(start: number, end: number, replacement: string): void {
    this.splices.push({ start, end, replacement });
  }

  /** Puts a text before the character at this place; several at one place follow one another as they came. */
  insert(at: number, text: string): void {
    if (text !== '') this.replace(at, at, text);
  }

  /** @throws RangeError where two changes overlap: a mistake of the caller */
  apply(): string {
    // The sort is stable: changes at one place keep their order.
    const ordered = [...this.splices].sort((a, b) => a.start - b.start || a.end - b.end);
    const pieces: string[] = [];
    let done = 0;
    for (const { start, end, replacement } of ordered) {
      if (start < done) throw new RangeError(`Two changes overlap at ${start}.`);
      pieces.push(this.text.slice(done, start), replacement);
      done = end;
    }
    pieces.push(this.text.slice(done));
    return pieces.join('');
  }
}
