import { queues, type QueueName } from '../queues';
import { handleAnalyse } from './analyse';
import { handleDigest } from './digest';
import { handleIngest } from './ingest';
import { handleMail } from './mail';
import { handleNightly } from './nightly';
import { handleReminders } from './reminders';

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
  // The clock and the sender work by themselves; these let them be asked for as well.
  { queue: queues.mail, atOnce: 1, handle: () => handleMail() },
  { queue: queues.reminders, atOnce: 1, handle: async () => void (await handleReminders()) },
  { queue: queues.digest, atOnce: 1, handle: async () => void (await handleDigest()) },
  { queue: queues.nightly, atOnce: 1, handle: async () => void (await handleNightly()) },
];
