/**
 * Entry of the working thread: messages in, messages out. It may use no host object but its own thread's.
 */
import { RequestAnswerer } from './answer-requests';
import type { WorkerReply, WorkerRequest } from './worker-protocol';

/** The few members of a worker's global object that are used; the DOM's types describe a page's. */
interface WorkerThread {
  postMessage(message: WorkerReply): void;
  onmessage: ((event: MessageEvent<WorkerRequest>) => void) | null;
}

const thread = self as unknown as WorkerThread;

/** Messages get their turn: a channel's message comes behind those that wait, and, unlike a timer, at once. */
const channel = new MessageChannel();
const waiting: (() => void)[] = [];
channel.port1.onmessage = () => waiting.shift()?.();
const pause = (): Promise<void> =>
  new Promise((resolve) => {
    waiting.push(resolve);
    channel.port2.postMessage(null);
  });

const answerer = new RequestAnswerer({ now: () => performance.now(), pause }, (reply) =>
  thread.postMessage(reply),
);
thread.onmessage = (event) => void answerer.receive(event.data);
