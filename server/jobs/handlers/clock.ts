import { handleDigest } from './digest';
import { handleNightly } from './nightly';
import { handleReminders } from './reminders';

const minuteMs = 60_000;
/** Digests go out in the morning of most of Europe, at 6 h UTC; a worker that was down then makes up for it by noon. */
const digestHours = { from: 6, to: 12 };

/**
 * What the time of day brings: reminders every minute, digests in the morning, checks at night. Each worker keeps its own clock; the
 * rows are locked and judged again before anything is sent, so that two clocks never do the same thing twice.
 */
export function startClock(report: (error: unknown) => void = () => undefined, everyMs = minuteMs) {
  let round: Promise<void> | null = null;
  const tick = () => {
    round ??= atMinute(new Date())
      .catch(report)
      .finally(() => (round = null));
  };
  const timer = setInterval(tick, everyMs);
  tick();
  return async function stop(): Promise<void> {
    clearInterval(timer);
    await round;
  };
}

export async function atMinute(now: Date): Promise<void> {
  await handleReminders(now);
  const hour = now.getUTCHours();
  if (hour >= digestHours.from && hour < digestHours.to) await handleDigest(now);
  await handleNightly(now);
}
