import PgBoss from 'pg-boss';

/** Every queue of the product. Work is handed over inside the transaction of the act that asks for it. */
export const queues = {
  /** Reads an uploaded file into readings, then analyses its lot. */
  ingest: 'ingest',
  /** Analyses a lot again after a withdrawal or a change of criteria. */
  analyse: 'analyse',
  /** Sends what is due in the outbox. */
  mail: 'mail',
  /** Once a minute: overdue holds are reminded and escalated. */
  reminders: 'reminders',
  /** Once a day: digest mails. */
  digest: 'digest',
  /** Nightly: checks the chain, signs a checkpoint, prunes sessions. */
  nightly: 'nightly',
} as const;
export type QueueName = (typeof queues)[keyof typeof queues];

export const jobSchema = 'jobs';

/** Made by the schema's owner: a queue is a table partition, and the application's role may make none. */
export async function createQueues(ownerUrl: string): Promise<void> {
  const boss = new PgBoss({
    connectionString: ownerUrl,
    schema: jobSchema,
    supervise: false,
    schedule: false,
    max: 2,
  });
  boss.on('error', () => undefined);
  await boss.start();
  try {
    for (const name of Object.values(queues)) {
      if (!(await boss.getQueue(name))) await boss.createQueue(name);
    }
  } finally {
    await boss.stop({ graceful: false, wait: true });
  }
}
