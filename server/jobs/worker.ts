import PgBoss from 'pg-boss';
import { config } from '../config';
import { database } from '../database/connection';
import { log } from '../http/request-log';
import { jobsChannel } from './boss';
import { handlers } from './handlers';
import { startClock } from './handlers/clock';
import { takeUpLapsed } from './handlers/ingest';
import { startMailSender } from './handlers/mail';
import { listen } from './listen';
import { jobSchema } from './queues';

const pollSeconds = 2;
const lapsedEveryMs = 10_000;

/**
 * Takes jobs and works on them until stopped. Polls, and is woken as well: a wake-up call is lost when the database
 * restarts, a poll is not. Errors of the connection are logged and outlived.
 */
export async function startWorker(): Promise<{ stop(): Promise<void> }> {
  const report = (error: unknown) => log(config()).error({ err: error }, 'worker');
  const boss = new PgBoss({
    connectionString: config().DATABASE_URL,
    schema: jobSchema,
    migrate: false,
    max: 4,
    application_name: 'quartzhold-jobs',
  });
  boss.on('error', report);
  await boss.start();

  const workers = new Map<string, string[]>();
  for (const { queue, atOnce, handle } of handlers) {
    const ids: string[] = [];
    for (let i = 0; i < atOnce; i += 1) {
      ids.push(
        await boss.work(queue, { pollingIntervalSeconds: pollSeconds }, async (jobs) => {
          for (const job of jobs) {
            try {
              await handle(job.data as never);
            } catch (error) {
              report(error);
              throw error;
            }
          }
        }),
      );
    }
    workers.set(queue, ids);
  }
  const wake = (queue: string) => workers.get(queue)?.forEach((id) => boss.notifyWorker(id));
  const listener = listen(database().pool, jobsChannel, wake);

  let sweeping: Promise<void> | null = null;
  const sweep = () => {
    sweeping ??= takeUpLapsed()
      .catch(report)
      .finally(() => (sweeping = null));
  };
  sweep();
  const timer = setInterval(sweep, lapsedEveryMs);
  const stopMailSender = startMailSender(report);
  const stopClock = startClock(report);
  return {
    async stop() {
      clearInterval(timer);
      await listener.stop();
      await Promise.all([
        stopMailSender(),
        stopClock(),
        boss.stop({ graceful: true, timeout: 15_000 }),
        sweeping,
      ]);
    },
  };
}
