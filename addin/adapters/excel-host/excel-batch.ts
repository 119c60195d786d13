/// <reference types="office-js" />
/**
 * The one place where batches are run: everything that goes to Excel passes through here, so that time-outs and
 * errors are met in one way.
 */
import type { Stop } from '../../ports/selection';
import { WorkbookError } from '../../ports/workbook';
import { workbookErrorOf } from './excel-errors';
import { refuseOldExcel } from './excel-requirements';

export interface ExcelTiming {
  /** How long an answer may take. Excel on the web has been seen never to answer. */
  readonly secondsToWait: number;
  /** Calls back once, after that many seconds, unless the returned function is called before. */
  readonly startTimer: (seconds: number, callback: () => void) => () => void;
  /** Ends once whatever else waits on this thread, such as a press, has had its turn. */
  readonly pause: () => Promise<void>;
}

export const usualTiming: ExcelTiming = {
  secondsToWait: 60,
  startTimer: (seconds, callback) => {
    const timer = setTimeout(callback, seconds * 1000);
    return () => clearTimeout(timer);
  },
  // A message comes at once where a timer would be held back.
  pause: () =>
    new Promise((resolve) => {
      const { port1, port2 } = new MessageChannel();
      port1.onmessage = () => {
        port1.close();
        resolve();
      };
      port2.postMessage(null);
    }),
};

export interface OpenBatch {
  readonly context: Excel.RequestContext;
  /** One round trip: sends what was asked for since the last one, and waits for the answer. */
  readonly sync: () => Promise<void>;
  /** Between two long pieces of work on what was read: lets the pane's thread hear a press. */
  readonly pause: () => Promise<void>;
}

/** What the library gives for an event that was registered. */
interface Registration {
  remove(): void;
  readonly context: OfficeExtension.ClientRequestContext;
}

export class ExcelBatches {
  constructor(private readonly timing: ExcelTiming = usualTiming) {}

  /**
   * Runs work that asks Excel for something. Not waiting for the user to leave a cell that is being edited is on
   * purpose: a write that Excel keeps waiting would happen at a time when nobody expects it any more.
   * @throws WorkbookError for every fault of the host
   */
  async run<T>(work: (batch: OpenBatch) => Promise<T>): Promise<T> {
    refuseOldExcel();
    // Excel.run itself may wait for ever where an answer never comes, so it is raced too, not only the sync inside.
    let giveUp: (error: WorkbookError) => void = () => undefined;
    const givenUp = new Promise<never>((_resolve, reject) => (giveUp = reject));
    givenUp.catch(() => undefined);
    const { pause } = this.timing;
    const running = Excel.run((context) =>
      work({ context, sync: () => this.syncInTime(context, giveUp), pause }),
    );
    running.catch(() => undefined);
    try {
      return await Promise.race([running, givenUp]);
    } catch (error) {
      throw workbookErrorOf(error);
    }
  }

  /** Registers events; the returned function takes them back, as far as Excel still answers. */
  async watch(register: (context: Excel.RequestContext) => readonly Registration[]): Promise<Stop> {
    const registrations = await this.run(async ({ context, sync }) => {
      const made = register(context);
      await sync();
      return made;
    });
    let isStopped = false;
    return () => {
      if (isStopped) return;
      isStopped = true;
      registrations.forEach((registration) => registration.remove());
      // Nobody waits for it: an event that still comes is a hint too many.
      void registrations[0]?.context.sync().catch(() => undefined);
    };
  }

  private async syncInTime(
    context: Excel.RequestContext,
    giveUp: (error: WorkbookError) => void,
  ): Promise<void> {
    const { secondsToWait, startTimer } = this.timing;
    const stopTimer = startTimer(secondsToWait, () =>
      giveUp(
        new WorkbookError(
          'no-answer',
          `Excel has not answered for ${secondsToWait} seconds. Look whether it waits for something, then try again.`,
          { canRetry: true },
        ),
      ),
    );
    try {
      await context.sync();
    } finally {
      stopTimer();
    }
  }
}
