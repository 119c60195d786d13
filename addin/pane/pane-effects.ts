/**
 * Does what the pane's updates ask for, through use-cases and ports, and answers with events. Every refusal of the
 * workbook and every fault of ours becomes a sentence here; nothing is swallowed.
 */
import { PlanEngineError, type PlanEngine } from '../ports/plan-engine';
import type { SpreadsheetHost } from '../ports/spreadsheet-host';
import { WorkbookError } from '../ports/workbook';
import { checkOpenPlan, putBackOpenPlan, solveOpenPlan } from '../use-cases/solve-open-workbook';
import { paneTexts } from '../wording/pane-texts';
import type { PaneEvent } from './pane-events';
import type { Failure, PaneCommand } from './pane-state';

/** What of the outside world the pane needs besides the workbook. */
export interface PaneSurroundings {
  readonly host: SpreadsheetHost;
  readonly engine: PlanEngine;
  /** The date and time now as a serial date counted from 1900. */
  readonly today: () => number;
  /** Calls back every so many milliseconds; gives the way to end that. */
  readonly repeat: (milliseconds: number, action: () => void) => () => void;
}

const quietMilliseconds = 1500;

const writingCommands: ReadonlySet<PaneCommand['kind']> = new Set<PaneCommand['kind']>([
  'write-statement',
  'solve',
  'write-results',
  'put-back',
  'end-journal',
]);

export class PaneEffects {
  private stopSolve: (() => void) | null = null;
  /** Ends the time in which hints of change are taken for echoes of our own writing. */
  private endQuiet: (() => void) | null = null;

  constructor(
    private readonly surroundings: PaneSurroundings,
    private readonly dispatch: (event: PaneEvent) => void,
  ) {}

  /** Watches the workbook from now on. A host that cannot tell of changes is no reason to fail. */
  async watch(): Promise<void> {
    const { host } = this.surroundings;
    try {
      await host.changes.watch(() => {
        if (this.endQuiet === null) this.dispatch({ kind: 'workbook-changed' });
      });
      await host.selection.watch(() => void this.readSelection());
    } catch (error) {
      if (!(error instanceof WorkbookError)) {
        throw error;
      }
    }
  }

  async perform(command: PaneCommand): Promise<void> {
    try {
      await this.performOrThrow(command);
      if (writingCommands.has(command.kind)) {
        this.keepQuiet();
      }
    } catch (error) {
      this.dispatch({ kind: 'failed', failure: this.failureOf(error, command) });
    }
  }

  private async performOrThrow(command: PaneCommand): Promise<void> {
    const { host, engine } = this.surroundings;
    switch (command.kind) {
      case 'read': {
        const workbook = await host.workbook.read();
        const activeSheet = await host.selection.activeSheet();
        this.dispatch({ kind: 'workbook-read', workbook, activeSheet });
        return;
      }
      case 'read-selection': {
        const ranges = await host.selection.selected();
        this.dispatch({ kind: 'selection-read', part: command.part, ranges });
        return;
      }
      case 'select':
        await host.selection.select(command.ranges);
        return;
      case 'write-statement':
        await host.workbook.apply(command.writes);
        this.dispatch({ kind: 'statement-written', writes: command.writes, next: command.next });
        return;
      case 'check': {
        const { planName } = command;
        const today = this.surroundings.today();
        const checked = await checkOpenPlan({ workbook: host.workbook, engine, planName, today });
        this.dispatch({ kind: 'checked', checked });
        return;
      }
      case 'solve':
        await this.solve(command);
        return;
      case 'stop':
        this.stopSolve?.();
        return;
      case 'write-results': {
        const { result, filteredSheets } = command;
        if (filteredSheets.length > 0) {
          await host.filters.clear(filteredSheets);
        }
        await host.workbook.apply(result.outcome.writes?.plan ?? [], result.read);
        this.dispatch({ kind: 'results-written' });
        return;
      }
      case 'put-back': {
        const { planName } = command;
        const today = this.surroundings.today();
        const ended = await putBackOpenPlan({ workbook: host.workbook, engine, planName, today });
        this.dispatch({ kind: 'put-back-ended', ended });
        return;
      }
      case 'end-journal':
        await (command.way === 'finish' ? host.journal.finish() : host.journal.putBack());
        this.dispatch({ kind: 'journal-ended', way: command.way });
        return;
    }
  }

  /**
   * Older hosts do not say who made a change, and tell of our own after it is long done. What others change within
   * these moments is found all the same when the plan is next solved or written.
   */
  private keepQuiet(): void {
    this.endQuiet?.();
    const end = this.surroundings.repeat(quietMilliseconds, () => {
      end();
      this.endQuiet = null;
    });
    this.endQuiet = end;
  }

  private async solve(command: Extract<PaneCommand, { kind: 'solve' }>): Promise<void> {
    const { host, engine, today, repeat } = this.surroundings;
    let elapsedSeconds = 0;
    let isStopWanted = false;
    const endTicking = repeat(1000, () => {
      elapsedSeconds++;
      this.dispatch({ kind: 'second-passed', elapsedSeconds });
    });
    this.stopSolve = () => {
      isStopWanted = true;
    };
    try {
      const end = await solveOpenPlan({
        workbook: host.workbook,
        engine,
        planName: command.planName,
        today: today(),
        keepDecisions: command.keepDecisions,
        onStage: (stage) => this.dispatch({ kind: 'stage-reached', stage }),
        onProgress: (progress) => this.dispatch({ kind: 'progressed', progress }),
        onStart: (stop) => {
          this.stopSolve = stop;
          // Stop was pressed while the workbook was still being read.
          if (isStopWanted) {
            stop();
          }
        },
      });
      const fault = end.kind === 'solved' ? end.fault : null;
      const failure = fault && this.failureOf(fault, command);
      this.dispatch({ kind: 'solve-ended', end, failure });
    } finally {
      endTicking();
      this.stopSolve = null;
    }
  }

  /** A selection that cannot be read now is none that is worth a message: the next change brings another hint. */
  private async readSelection(): Promise<void> {
    try {
      const ranges = await this.surroundings.host.selection.selected();
      this.dispatch({ kind: 'selection-read', part: null, ranges });
    } catch (error) {
      if (!(error instanceof WorkbookError)) {
        throw error;
      }
    }
  }

  private failureOf(error: unknown, command: PaneCommand): Failure {
    if (error instanceof WorkbookError) {
      const { message, code, sheets } = error;
      const unfinished = code === 'half-written' ? this.surroundings.host.journal.unfinished() : [];
      const ranges = unfinished.length > 0 ? unfinished : error.ranges;
      return { sentence: message, code, sheets, ranges, retry: error.canRetry ? command : null };
    }
    const isLost = error instanceof PlanEngineError && error.code === 'lost';
    const message = error instanceof Error ? error.message : String(error);
    return {
      sentence: isLost ? paneTexts.threadLost : paneTexts.crashed(message),
      code: null,
      sheets: [],
      ranges: [],
      retry: isLost ? command : null,
    };
  }
}
