/**
 * Collects the warnings of one reading: one of each kind, with the first case and the count, since a file that gives
 * cause for a warning often does so in hundreds of lines.
 */
import type { MpsWarning, MpsWarningCode } from './mps-errors';

interface Tally {
  readonly line: number;
  readonly firstName: string;
  count: number;
}

export class MpsWarningTally {
  private readonly tallies = new Map<MpsWarningCode, Tally>();

  /** @param name the row, column or set that is spoken of */
  add(code: MpsWarningCode, line: number, name: string): void {
    const tally = this.tallies.get(code);
    if (tally === undefined) {
      this.tallies.set(code, { line, firstName: name, count: 1 });
    } else {
      tally.count++;
    }
  }

  /** One warning a kind, in the order of their first cases. */
  list(): readonly MpsWarning[] {
    return Array.from(this.tallies, ([code, { line, firstName, count }]) => {
      const others = count > 1 ? ` (and ${count - 1} more like it)` : '';
      return { code, line, message: `Line ${line}: ${sentence(code, firstName)}${others}.` };
    });
  }
}

function sentence(code: MpsWarningCode, name: string): string {
  switch (code) {
    case 'no-objective':
      return 'there is no N row, so the objective is 0';
    case 'ignored-free-row':
      return `row "${name}" is a further N row and is left out`;
    case 'ignored-set':
      return `set "${name}" is not the first of its section and is left out`;
    case 'ignored-range':
      return `the range on N row "${name}" means nothing and is left out`;
    case 'negative-upper-bound':
      return `column "${name}" has a negative upper bound and no lower one, so it has no lower bound`;
    case 'integer-without-bounds':
      return `whole-number column "${name}" has no bounds, so it lies between 0 and 1`;
  }
}
