/**
 * The plan engine of a page in a browser: a worker of the page's own origin, timers and channels of the page.
 */
import type { PlanEngine } from '../../ports/plan-engine';
import type { WorkerReply } from '../../worker/worker-protocol';
import { WorkerPlanEngine, type WorkerLike } from './worker-plan-engine';

/** Ends once whatever else is waiting has had its turn; a message, unlike a timer, comes at once. */
function pause(): Promise<void> {
  return new Promise((resolve) => {
    const { port1, port2 } = new MessageChannel();
    port1.onmessage = () => {
      port1.close();
      resolve();
    };
    port2.postMessage(null);
  });
}

function startWorker(): WorkerLike {
  const worker = new Worker(new URL('../../worker/solver-worker.ts', import.meta.url), {
    name: 'planrow-solver',
  });
  return {
    postMessage: (message, transfer) => worker.postMessage(message, transfer),
    terminate: () => worker.terminate(),
    listen: (onReply, onError) => {
      worker.onmessage = (event: MessageEvent<WorkerReply>) => onReply(event.data);
      worker.onmessageerror = onError;
      worker.onerror = onError;
    },
  };
}

export function browserPlanEngine(): PlanEngine {
  return new WorkerPlanEngine({
    startWorker,
    // Loaded only where no worker can be had: the working part would otherwise be in the page twice.
    loadFallback: async () => {
      const { InlinePlanEngine } = await import('./inline-plan-engine');
      return new InlinePlanEngine({ now: () => performance.now(), pause });
    },
    pause,
    runAfter: (milliseconds, action) => {
      const timer = setTimeout(action, milliseconds);
      return () => clearTimeout(timer);
    },
  });
}
