import PgBoss from 'pg-boss';
import { type Transaction } from 'sequelize';
import { connectionOf } from '../database/connection';
import { type QueueName, jobSchema } from './queues';

export const jobsChannel = 'quartzhold_jobs';

/** Never started: it only knows how a job is written. Its own connection is never opened. */
let writer: PgBoss | undefined;
function jobWriter(): PgBoss {
  writer ??= new PgBoss({
    schema: jobSchema,
    migrate: false,
    db: {
      executeSql: () =>
        Promise.reject(new Error('A job is only handed over inside the transaction of its act.')),
    },
  });
  return writer;
}

/**
 * Hands work to a queue inside the transaction of the act that asks for it: the job exists if and only if the act does.
 * Workers are woken when it commits. Repeating is each handler's own affair, so pg-boss itself tries once.
 */
export async function enqueue(
  transaction: Transaction,
  queue: QueueName,
  data: object,
): Promise<void> {
  const client = connectionOf(transaction);
  await jobWriter().send(queue, data, {
    retryLimit: 0,
    expireInHours: 12,
    db: { executeSql: (text: string, values: unknown[]) => client.query(text, values) },
  });
  await client.query('SELECT pg_notify($1, $2)', [jobsChannel, queue]);
}
