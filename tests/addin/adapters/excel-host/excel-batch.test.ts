/**
 * The one place where batches are run: slow answers, answers that never come, and what is left behind.
 */
import { ExcelBatches, usualTiming } from '../../../../addin/adapters/excel-host/excel-batch';
import { openDescribed, refusalOf } from './open-in-excel';

/** A host that answers when it is let. */
function slowHost(): { answer: () => void; batches: ExcelBatches; timeOut: () => void; timers: Set<number> } {
  const { host } = openDescribed({ sheets: { Plan: { A1: 7 } } });
  const waiting: (() => void)[] = [];
  host.beforeAnswer = () => new Promise((resolve) => waiting.push(resolve));
  const timers = new Set<number>();
  const callbacks: (() => void)[] = [];
  const batches = new ExcelBatches({
    ...usualTiming,
    secondsToWait: 30,
    startTimer: (seconds, callback) => {
      timers.add(seconds);
      callbacks.push(callback);
      return () => timers.delete(seconds);
    },
  });
  return {
    batches,
    timers,
    answer: () => waiting.splice(0).forEach((go) => go()),
    timeOut: () => callbacks.splice(0).forEach((callback) => callback()),
  };
}

const turn = (): Promise<void> => new Promise((resolve) => setImmediate(resolve));

function readA1(batches: ExcelBatches): Promise<unknown> {
  return batches.run(async ({ context, sync }) => {
    const range = context.workbook.worksheets.getItem('Plan').getRange('A1').load('values');
    await sync();
    return range.values[0][0] as unknown;
  });
}

it('a slow host is waited for, and its timer is stopped', async () => {
  const { answer, batches, timers } = slowHost();
  const read = readA1(batches);
  await turn();
  expect([...timers]).toEqual([30]);
  answer();
  expect(await read).toBe(7);
  expect([...timers]).toEqual([]);
});

it('one that does not answer in time is given up with a sentence, and what comes later does no harm', async () => {
  const { answer, batches, timeOut } = slowHost();
  const read = refusalOf(readA1(batches));
  await turn();
  timeOut();
  const refusal = await read;
  expect(refusal).toMatchObject({ code: 'no-answer', canRetry: true });
  expect(refusal.message).toContain('30 seconds');
  answer();
  await turn();
  const again = readA1(batches);
  await turn();
  answer();
  expect(await again).toBe(7);
});

it('a fault of our own comes out as it is', async () => {
  openDescribed({ sheets: { Plan: {} } });
  const bug = new RangeError('a bug');
  await expect(new ExcelBatches().run(() => Promise.reject(bug))).rejects.toBe(bug);
});

it('between two pieces of work the thread is given back', async () => {
  let isHeard = false;
  setImmediate(() => (isHeard = true));
  for (let count = 0; count < 100 && !isHeard; count++) await usualTiming.pause();
  expect(isHeard).toBe(true);
});
