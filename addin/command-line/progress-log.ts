/**
 * Progress of a solve as short lines: at most one a second, and one at its end.
 */
import type { Progress } from '#solver-core';
import { countedNoun, numberText, secondsText } from './number-texts';

/** Seconds between two lines. */
const interval = 1;

export class ProgressLog {
  private startedAt = 0;
  private lastLineAt = 0;

  constructor(
    private readonly clock: () => number,
    private readonly print: (line: string) => void,
  ) {}

  started(): void {
    this.startedAt = this.clock();
    this.lastLineAt = this.startedAt;
  }

  progress(progress: Progress): void {
    const now = this.clock();
    if (now - this.lastLineAt < interval) {
      return;
    }
    this.lastLineAt = now;
    this.print(
      `${secondsText(now - this.startedAt)}  ${progress.stage}  ${countedNoun(progress.iterations, 'iteration')}  ` +
        `objective ${numberText(progress.objective)}  infeasibility ${numberText(progress.primalInfeasibility)}\n`,
    );
  }

  ended(status: string, iterations: number): void {
    const elapsed = secondsText(this.clock() - this.startedAt);
    this.print(`${elapsed}  ${status}  ${countedNoun(iterations, 'iteration')}\n`);
  }
}
