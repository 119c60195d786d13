/**
 * The working thread without a thread: requests and replies are cloned as between threads, and the same plan must end
 * as it does on one thread. The small plan and its optimum are worked out by hand in solve-model.test.ts.
 */
import { InlinePlanEngine } from '../../../addin/adapters/solver-thread/inline-plan-engine';
import {
  WorkerPlanEngine,
  type WorkerEngineParts,
  type WorkerLike,
} from '../../../addin/adapters/solver-thread/worker-plan-engine';
import type { PlanEngine, PlanEvents, SolvePlanRequest } from '../../../addin/ports/plan-engine';
import { RequestAnswerer } from '../../../addin/worker/answer-requests';
import type { WorkerReply, WorkerRequest } from '../../../addin/worker/worker-protocol';
import { tileWorkbook } from '../domain/model-from-sheet/tile-works';

const immediately = (): Promise<void> => new Promise((resolve) => setImmediate(resolve));
const pacing = { now: () => 0, pause: immediately };

/** A worker on this thread that hears and says clones. */
class ClonedWorker implements WorkerLike {
  hear: (reply: WorkerReply) => void = () => undefined;
  fail: () => void = () => undefined;
  isEnded = false;
  readonly heard: WorkerRequest['kind'][] = [];
  private readonly answerer = new RequestAnswerer(pacing, (reply) => {
    const heard = structuredClone(reply);
    if (!this.isEnded) this.hear(heard);
  });

  constructor(private readonly isDeaf = false) {}

  postMessage(message: WorkerRequest, transfer: ArrayBuffer[]): void {
    this.heard.push(message.kind);
    if (!this.isDeaf) void this.answerer.receive(structuredClone(message, { transfer }));
  }

  listen(onReply: (reply: WorkerReply) => void, onError: () => void): void {
    this.hear = onReply;
    this.fail = onError;
  }

  terminate(): void {
    this.isEnded = true;
  }
}

/** Timers that go off when the test says so. */
class Timers {
  private readonly waiting = new Set<() => void>();

  readonly runAfter = (_milliseconds: number, action: () => void): (() => void) => {
    this.waiting.add(action);
    return () => this.waiting.delete(action);
  };

  goOff(): void {
    const due = [...this.waiting];
    this.waiting.clear();
    due.forEach((action) => action());
  }
}

function engineWith(parts: Partial<WorkerEngineParts>): { engine: PlanEngine; timers: Timers } {
  const timers = new Timers();
  const engine = new WorkerPlanEngine({
    startWorker: () => new ClonedWorker(),
    loadFallback: () => Promise.resolve(new InlinePlanEngine(pacing)),
    pause: immediately,
    runAfter: timers.runAfter,
    ...parts,
  });
  return { engine, timers };
}

const request = (): SolvePlanRequest => ({
  workbook: tileWorkbook().snapshot(),
  planName: 'Week',
  today: 46_000,
  keepDecisions: false,
});

const deafEvents: PlanEvents = { onStage: () => undefined, onProgress: () => undefined };

it('a plan ends in the working thread as it does on this one, writes and all', async () => {
  const { engine } = engineWith({});
  const stages: string[] = [];
  const outcome = await engine.solve(request(), { ...deafEvents, onStage: (stage) => stages.push(stage) })
    .outcome;
  const inline = await new InlinePlanEngine(pacing).solve(request(), deafEvents).outcome;
  expect(outcome).toEqual(inline);
  expect(outcome).toMatchObject({ kind: 'solved', status: 'optimal', sense: 'maximise' });
  expect([...new Set(stages)]).toEqual(['reading', 'solving', 'preparing']);
});

it('an invalid plan comes back with its issues, and a check with the size', async () => {
  const { engine } = engineWith({});
  const workbook = tileWorkbook({ cells: { C7: '<' } }).snapshot();
  const outcome = await engine.solve({ ...request(), workbook }, deafEvents).outcome;
  expect(outcome).toMatchObject({ kind: 'invalid', issues: [{ code: 'strict-relation' }] });
  expect(await engine.check(request())).toMatchObject({
    planName: 'Week',
    size: { decisions: 3, constraints: 3 },
    issues: [],
  });
});

it('puts back through the working thread', async () => {
  const workbook = tileWorkbook();
  const { engine } = engineWith({});
  expect(await engine.putBack({ ...request(), workbook: workbook.snapshot() })).toBeNull();
  const outcome = await engine.solve({ ...request(), workbook: workbook.snapshot() }, deafEvents).outcome;
  if (outcome.kind !== 'solved' || outcome.writes === null) throw new Error('There is no plan to write.');
  await workbook.apply(outcome.writes.plan);
  const putBack = await engine.putBack({ ...request(), workbook: workbook.snapshot() });
  await workbook.apply(putBack!.plan);
  expect(workbook.snapshot().sheets[0].cell(1, 1)?.value).toBe(10);
});

it('does the work on this thread where no worker may be started', async () => {
  const { engine } = engineWith({
    startWorker: () => {
      throw new Error('Refused by the page’s policy.');
    },
  });
  expect(await engine.solve(request(), deafEvents).outcome).toMatchObject({ status: 'optimal' });
  expect(await engine.check(request())).toMatchObject({ issues: [] });
});

it('does the work on this thread where the worker’s file cannot be had, or it never answers', async () => {
  for (const end of ['error', 'silence'] as const) {
    const worker = new ClonedWorker(true);
    const { engine, timers } = engineWith({ startWorker: () => worker });
    const { outcome } = engine.solve(request(), deafEvents);
    while (worker.heard.length === 0) await immediately();
    if (end === 'error') worker.fail();
    else timers.goOff();
    expect(await outcome).toMatchObject({ status: 'optimal' });
    expect(worker.isEnded).toBe(true);
  }
});

it('a worker that ends in the middle is told as lost, and the next request gets a new one', async () => {
  const workers: ClonedWorker[] = [];
  const { engine } = engineWith({
    startWorker: () => {
      const worker = new ClonedWorker(workers.length === 0);
      workers.push(worker);
      return worker;
    },
  });
  const { outcome } = engine.solve(request(), deafEvents);
  while ((workers[0]?.heard.length ?? 0) === 0) await immediately();
  workers[0].hear({ version: 1, id: 1, kind: 'stage', stage: 'reading' });
  workers[0].fail();
  await expect(outcome).rejects.toMatchObject({ name: 'PlanEngineError', code: 'lost' });
  expect(await engine.check(request())).toMatchObject({ issues: [] });
  expect(workers).toHaveLength(2);
});

it('a stop before anything is read ends at once', async () => {
  const { engine } = engineWith({});
  const running = engine.solve(request(), deafEvents);
  running.stop();
  expect(await running.outcome).toEqual({ kind: 'stopped-beforehand' });
});

it('a stop is heard between slices of the solve', async () => {
  const worker = new ClonedWorker();
  const { engine } = engineWith({ startWorker: () => worker });
  const running = engine.solve(request(), {
    ...deafEvents,
    onStage: (stage) => {
      if (stage === 'solving') running.stop();
    },
  });
  const outcome = await running.outcome;
  expect(worker.heard).toEqual(['solve', 'stop']);
  expect(outcome).toMatchObject({ kind: 'solved' });
});

it('a worker that does not hear a stop is ended', async () => {
  const worker = new ClonedWorker(true);
  const { engine, timers } = engineWith({ startWorker: () => worker });
  const running = engine.solve(request(), deafEvents);
  while (worker.heard.length === 0) await immediately();
  worker.hear({ version: 1, id: 1, kind: 'stage', stage: 'reading' });
  running.stop();
  timers.goOff();
  expect(await running.outcome).toEqual({ kind: 'stopped-beforehand' });
  expect(worker.isEnded).toBe(true);
});

it('a worker of another version is refused in words', async () => {
  const replies: WorkerReply[] = [];
  const answerer = new RequestAnswerer(pacing, (reply) => replies.push(reply));
  await answerer.receive({ version: 0, id: 7, kind: 'check', task: {}, workbook: {} } as never);
  expect(replies).toEqual([
    { version: 1, id: 7, kind: 'crashed', message: 'This worker speaks version 1, not 0.' },
  ]);
});
