/**
 * The working thread's side of the protocol, without the thread: requests in, replies out. One piece of work at a
 * time; a stop is heard between its slices.
 */
import { checkPlan, putBackPlan, solvePlan } from './plan-work';
import type { Pacing } from './time-slicing';
import { unpackWorkbook } from './workbook-transfer';
import { packWritePlan, protocolVersion, type WorkerReply, type WorkerRequest } from './worker-protocol';

type Reply = WorkerReply extends infer R
  ? R extends WorkerReply
    ? Omit<R, 'version' | 'id'>
    : never
  : never;

/** Milliseconds between two words on the progress: more often nobody can read it. */
const progressMilliseconds = 150;

export class RequestAnswerer {
  private readonly stopped = new Set<number>();
  private work: Promise<void> = Promise.resolve();

  constructor(
    private readonly pacing: Pacing,
    private readonly post: (reply: WorkerReply) => void,
  ) {}

  /** Ends once this request, and those before it, are answered. */
  receive(request: WorkerRequest): Promise<void> {
    if (request.kind === 'stop') {
      this.stopped.add(request.id);
      return Promise.resolve();
    }
    this.work = this.work.then(() => this.answer(request));
    return this.work;
  }

  private async answer(request: Exclude<WorkerRequest, { kind: 'stop' }>): Promise<void> {
    const { id } = request;
    const reply = (content: Reply): void => this.post({ version: protocolVersion, id, ...content });
    try {
      if (request.version !== protocolVersion) {
        throw new Error(`This worker speaks version ${protocolVersion}, not ${request.version}.`);
      }
      // Tells the sender that somebody is there, before the long part begins.
      reply({ kind: 'stage', stage: 'reading' });
      const workbook = unpackWorkbook(request.workbook);
      switch (request.kind) {
        case 'check':
          reply({ kind: 'checked', check: checkPlan(workbook, request.task) });
          break;
        case 'put-back': {
          const putBack = putBackPlan(workbook, request.task);
          reply({
            kind: 'planned-back',
            putBack: putBack && { ...putBack, plan: packWritePlan(putBack.plan) },
          });
          break;
        }
        case 'solve': {
          let saidAt = -Infinity;
          const outcome = await solvePlan(workbook, request.task, {
            pacing: this.pacing,
            isStopping: () => this.stopped.has(id),
            onStage: (stage) => reply({ kind: 'stage', stage }),
            onProgress: (progress) => {
              const now = this.pacing.now();
              if (now - saidAt >= progressMilliseconds) {
                saidAt = now;
                reply({ kind: 'progress', progress });
              }
            },
          });
          const writes = outcome.kind === 'solved' ? outcome.writes : null;
          reply({
            kind: 'solved',
            outcome:
              outcome.kind === 'solved' && writes !== null
                ? { ...outcome, writes: { ...writes, plan: packWritePlan(writes.plan) } }
                : outcome,
          });
          break;
        }
      }
    } catch (error) {
      reply({ kind: 'crashed', message: error instanceof Error ? error.message : String(error) });
    } finally {
      this.stopped.delete(id);
    }
  }
}
