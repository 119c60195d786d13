/**
 * A running pane without a page: program, memory host and engine on this thread; and ways to wait until it rests.
 */
import { InlinePlanEngine } from '../../../addin/adapters/solver-thread/inline-plan-engine';
import { MemoryHost } from '../../../addin/adapters/memory/memory-host';
import type { MemoryWorkbook } from '../../../addin/adapters/memory/memory-workbook';
import { PaneProgram } from '../../../addin/pane/pane-program';
import type { PaneEvent } from '../../../addin/pane/pane-events';
import type { PaneState, StartCommand } from '../../../addin/pane/pane-state';
import type { PlanEngine } from '../../../addin/ports/plan-engine';
import type { SpreadsheetHost } from '../../../addin/ports/spreadsheet-host';
import { columnOfLetters } from '../../../addin/domain/sheet/cell-address';
import type { CellRange } from '../../../addin/domain/sheet/cell-range';

const immediately = (): Promise<void> => new Promise((resolve) => setImmediate(resolve));

export const inlineEngine = new InlinePlanEngine({ now: () => 0, pause: immediately });

export interface PaneAtWork {
  readonly workbook: MemoryWorkbook;
  readonly host: MemoryHost;
  readonly state: () => PaneState;
  /** Everything that a screen reader was told so far. */
  readonly said: readonly string[];
  /** Does one thing and waits until nothing is under way. */
  readonly press: (event: PaneEvent) => Promise<PaneState>;
  /** Does one thing and does not wait. */
  readonly begin: (event: PaneEvent) => void;
  readonly rest: () => Promise<PaneState>;
  /** Selects cells on the sheet, as the planner would. */
  readonly select: (...texts: string[]) => Promise<void>;
  /** What stands in a cell. */
  readonly value: (text: string) => unknown;
}

/** @param over parts of the host that answer otherwise */
export async function paneAtWork(
  workbook: MemoryWorkbook,
  over: { command?: StartCommand; host?: Partial<SpreadsheetHost>; engine?: PlanEngine } = {},
): Promise<PaneAtWork> {
  const host = new MemoryHost(workbook);
  const parts: SpreadsheetHost = {
    workbook: host.workbook,
    selection: host.selection,
    changes: host.changes,
    filters: host.filters,
    journal: host.journal,
    isDark: () => host.isDark(),
    ...over.host,
  };
  const program = new PaneProgram({
    host: parts,
    engine: over.engine ?? inlineEngine,
    today: () => 46_000,
    repeat: (_milliseconds, action) => {
      const turn = setImmediate(action);
      return () => clearImmediate(turn);
    },
  });
  const said: string[] = [];
  let heard = 0;
  program.subscribe(() => {
    const { text, number } = program.state().announcement;
    if (number > heard) {
      heard = number;
      said.push(text);
    }
  });
  const rest = async (): Promise<PaneState> => {
    // A command may begin a turn after the one before it has ended.
    for (let quiet = 0; quiet < 5; quiet++) {
      await immediately();
      if (program.state().activity.kind !== 'idle') quiet = 0;
    }
    return program.state();
  };
  program.start(over.command ?? 'open');
  await rest();
  return {
    workbook,
    host,
    state: program.state,
    said,
    begin: program.dispatch,
    press: (event) => {
      program.dispatch(event);
      return rest();
    },
    rest,
    select: async (...texts) => {
      await host.select(texts.map(rangeOf));
      await rest();
    },
    value: (text) => {
      const { sheet, top, left } = rangeOf(text);
      const found = workbook.snapshot().sheets.find(({ name }) => name === sheet);
      return found?.cell(top, left)?.value ?? null;
    },
  };
}

/** `Plan!B2:B4` or `Plan!B2`. */
export function rangeOf(text: string): CellRange {
  const [, sheet, left, top, right, bottom] = /^(.+)!([A-Z]+)(\d+)(?::([A-Z]+)(\d+))?$/.exec(text)!;
  return {
    sheet,
    top: Number(top) - 1,
    left: columnOfLetters(left),
    bottom: Number(bottom ?? top) - 1,
    right: columnOfLetters(right ?? left),
  };
}
