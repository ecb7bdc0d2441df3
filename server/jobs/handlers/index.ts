import { queues, type QueueName } from '../queues';
import { handleAnalyse } from './analyse';
import { handleIngest } from './ingest';

export interface Handler {
  queue: QueueName;
  /** How many jobs of the queue run in one worker at a time. */
  atOnce: number;
  handle: (data: never) => Promise<void>;
}

/** What the worker does, one line a queue. */
export const handlers: Handler[] = [
  // Two, so that a small file need not wait for a large one.
  { queue: queues.ingest, atOnce: 2, handle: handleIngest },
  { queue: queues.analyse, atOnce: 1, handle: handleAnalyse },
];
