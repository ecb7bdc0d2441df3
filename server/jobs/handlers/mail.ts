import { sendDueMails } from '../../mail/send-due';
import { onWake } from '../../mail/wake';

/** Queue `mail`: sends what is due in the outbox. */
export async function handleMail(): Promise<void> {
  await sendDueMails();
}

const everyMs = 2_000;

/**
 * Looks into the outbox every two seconds, and at once when this process itself committed a mail. Polling, because a
 * wake-up call can be lost: a restarted database forgets its listeners. Returns a stop that waits for the running round.
 */
export function startMailSender(report: (error: unknown) => void = () => undefined) {
  let stopped = false;
  let round: Promise<void> | undefined;
  let again = false;
  const run = () => {
    if (stopped) return;
    if (round) {
      again = true;
      return;
    }
    round = handleMail()
      .catch(report)
      .finally(() => {
        round = undefined;
        if (again) {
          again = false;
          run();
        }
      });
  };
  const timer = setInterval(run, everyMs);
  onWake(run);
  run();
  return async function stop(): Promise<void> {
    stopped = true;
    clearInterval(timer);
    onWake(undefined);
    await round;
  };
}
