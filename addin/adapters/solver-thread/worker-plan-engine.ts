/**
 * PlanEngine over a worker. The worker is started when it is first needed; where it cannot be, everything is done on
 * this thread instead. A worker that does not hear a stop, because it is deep in reading, is ended and replaced.
 */
import type { PutBack } from '../../domain/results-to-sheet/plan-put-back';
import type { PlanOutcome } from '../../domain/results-to-sheet/plan-outcome';
import type { WorkbookSnapshot } from '../../domain/sheet/sheet-snapshot';
import {
  PlanEngineError,
  type PlanCheck,
  type PlanEngine,
  type PlanEvents,
  type PlanRequest,
  type RunningPlan,
  type SolvePlanRequest,
  type StoppedBeforehand,
} from '../../ports/plan-engine';
import { buffersOf, packWorkbook } from '../../worker/workbook-transfer';
import {
  protocolVersion,
  unpackWritePlan,
  type WorkerReply,
  type WorkerRequest,
} from '../../worker/worker-protocol';

/** What is used of a Worker. */
export interface WorkerLike {
  postMessage(message: WorkerRequest, transfer: ArrayBuffer[]): void;
  terminate(): void;
  /** Called once, before anything is posted. @param onError the worker could not be loaded, or threw */
  listen(onReply: (reply: WorkerReply) => void, onError: () => void): void;
}

export interface WorkerEngineParts {
  /** Starts the working thread. May throw where the host forbids it. */
  readonly startWorker: () => WorkerLike;
  /** The same work on this thread; asked for only when the worker cannot be had. */
  readonly loadFallback: () => Promise<PlanEngine>;
  /** Ends once whatever else is waiting has had its turn. */
  readonly pause: () => Promise<void>;
  /** Calls back after so many milliseconds; gives the way to take that back. */
  readonly runAfter: (milliseconds: number, action: () => void) => () => void;
}

/** A worker that has said nothing for so long after it was started is not coming. */
const startMilliseconds = 10_000;
/** How long a stop may go unheard before the worker is ended. */
const stopMilliseconds = 1_500;

interface Pending {
  readonly resolve: (reply: WorkerReply) => void;
  readonly reject: (error: PlanEngineError) => void;
  readonly events: PlanEvents | null;
}

/** The worker could not be started, or never answered: this is no fault of the work. */
class WorkerNotHad extends Error {}

type Task =
  | { readonly kind: 'check' | 'put-back'; readonly task: { planName: string; today: number } }
  | {
      readonly kind: 'solve';
      readonly task: { planName: string; today: number; keepDecisions: boolean };
    };

export class WorkerPlanEngine implements PlanEngine {
  private worker: WorkerLike | null = null;
  private hasAnswered = false;
  private isUnavailable = false;
  private fallback: Promise<PlanEngine> | null = null;
  private lastId = 0;
  private readonly pending = new Map<number, Pending>();

  constructor(private readonly parts: WorkerEngineParts) {}

  async check(request: PlanRequest): Promise<PlanCheck> {
    const { planName, today } = request;
    const reply = await this.ask(request.workbook, { kind: 'check', task: { planName, today } });
    if (reply === null) {
      return (await this.inThread()).check(request);
    }
    return expected(reply, 'checked').check;
  }

  async putBack(request: PlanRequest): Promise<PutBack | null> {
    const { planName, today } = request;
    const reply = await this.ask(request.workbook, { kind: 'put-back', task: { planName, today } });
    if (reply === null) {
      return (await this.inThread()).putBack(request);
    }
    const { putBack } = expected(reply, 'planned-back');
    return putBack && { ...putBack, plan: unpackWritePlan(putBack.plan) };
  }

  solve(request: SolvePlanRequest, events: PlanEvents): RunningPlan {
    const id = ++this.lastId;
    let isStopping = false;
    let stopInThread: (() => void) | null = null;
    const run = async (): Promise<PlanOutcome | StoppedBeforehand> => {
      const { planName, today, keepDecisions } = request;
      const task = { kind: 'solve', task: { planName, today, keepDecisions } } as const;
      const reply = await this.ask(request.workbook, task, id, events, () => isStopping);
      if (reply === null) {
        const running = (await this.inThread()).solve(request, events);
        stopInThread = () => running.stop();
        if (isStopping) {
          running.stop();
        }
        return running.outcome;
      }
      const { outcome } = expected(reply, 'solved');
      return outcome.kind === 'solved' && outcome.writes !== null
        ? { ...outcome, writes: { ...outcome.writes, plan: unpackWritePlan(outcome.writes.plan) } }
        : outcome;
    };
    return {
      outcome: run(),
      stop: () => {
        isStopping = true;
        stopInThread?.();
        this.stop(id);
      },
    };
  }

  /** The worker's answer; null where no worker can be had. */
  private async ask(
    workbook: WorkbookSnapshot,
    task: Task,
    id = ++this.lastId,
    events: PlanEvents | null = null,
    isStopping: () => boolean = () => false,
  ): Promise<WorkerReply | null> {
    if (this.isUnavailable) {
      return null;
    }
    const packed = await packWorkbook(workbook, this.parts.pause);
    if (isStopping()) {
      return { version: protocolVersion, id, kind: 'solved', outcome: { kind: 'stopped-beforehand' } };
    }
    try {
      return await new Promise<WorkerReply>((resolve, reject) => {
        const worker = this.runningWorker();
        this.pending.set(id, { resolve, reject, events });
        const request = { version: protocolVersion, id, workbook: packed, ...task } as WorkerRequest;
        worker.postMessage(request, buffersOf(packed));
        if (!this.hasAnswered) {
          this.parts.runAfter(startMilliseconds, () => {
            if (worker === this.worker && !this.hasAnswered) {
              this.endWorker(new WorkerNotHad('The worker does not answer.'));
            }
          });
        }
      });
    } catch (error) {
      if (error instanceof PlanEngineError && !(error.cause instanceof WorkerNotHad)) {
        throw error;
      }
      this.isUnavailable = true;
      return null;
    }
  }

  private runningWorker(): WorkerLike {
    if (this.worker === null) {
      const worker = this.parts.startWorker();
      worker.listen(
        (reply) => this.receive(reply),
        () => this.endWorker(this.hasAnswered ? null : new WorkerNotHad('The worker could not be started.')),
      );
      this.worker = worker;
      this.hasAnswered = false;
    }
    return this.worker;
  }

  private receive(reply: WorkerReply): void {
    this.hasAnswered = true;
    const pending = this.pending.get(reply.id);
    if (pending === undefined) {
      return;
    }
    switch (reply.kind) {
      case 'stage':
        pending.events?.onStage(reply.stage);
        return;
      case 'progress':
        pending.events?.onProgress(reply.progress);
        return;
      case 'crashed':
        this.pending.delete(reply.id);
        pending.reject(new PlanEngineError('crashed', reply.message));
        return;
      case 'checked':
      case 'solved':
      case 'planned-back':
        this.pending.delete(reply.id);
        pending.resolve(reply);
        return;
    }
  }

  private stop(id: number): void {
    if (this.worker === null || !this.pending.has(id)) {
      return;
    }
    this.worker.postMessage({ version: protocolVersion, id, kind: 'stop' }, []);
    this.parts.runAfter(stopMilliseconds, () => {
      const pending = this.pending.get(id);
      if (pending !== undefined) {
        this.pending.delete(id);
        this.endWorker(null);
        pending.resolve({
          version: protocolVersion,
          id,
          kind: 'solved',
          outcome: { kind: 'stopped-beforehand' },
        });
      }
    });
  }

  /** Ends the worker; the next request starts another. @param cause that it was never had, or null */
  private endWorker(cause: WorkerNotHad | null): void {
    this.worker?.terminate();
    this.worker = null;
    const lost = [...this.pending.values()];
    this.pending.clear();
    for (const { reject } of lost) {
      reject(new PlanEngineError('lost', 'The working thread has ended.', cause === null ? {} : { cause }));
    }
  }

  private inThread(): Promise<PlanEngine> {
    this.fallback ??= this.parts.loadFallback();
    return this.fallback;
  }
}

function expected<Kind extends WorkerReply['kind']>(
  reply: WorkerReply,
  kind: Kind,
): Extract<WorkerReply, { kind: Kind }> {
  if (reply.kind !== kind) {
    throw new PlanEngineError('crashed', `The working thread answered ${reply.kind} where ${kind} was due.`);
  }
  return reply as Extract<WorkerReply, { kind: Kind }>;
}
