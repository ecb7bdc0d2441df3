import { type HoldState, dueNow } from '../../policies/holds';

const hourMs = 3600 * 1000;
/** Between reminders once the time has passed. */
const overdueEveryMs = 24 * hourMs;
/** For one due time; then only the list of overdue holds reminds. */
export const greatestReminders = 6;

export interface RemindedHold {
  state: HoldState;
  openedAt: Date;
  acknowledgedAt: Date | null;
  acknowledgementDueAt: Date;
  answerDueAt: Date;
  /** For the due time that counts now; set back by the acknowledgement. */
  remindersSent: number;
  lastReminderAt: Date | null;
}

export interface ReminderDue {
  phase: 'before' | 'overdue';
  /** The quality engineers hear of it too. */
  escalate: boolean;
}

/**
 * What is due now for a hold, if anything: once a day before the time (or at half of a shorter wait), once when it has
 * passed, then daily, six in all. Quality engineers hear of the first and the third overdue one.
 */
export function reminderDue(hold: RemindedHold, now: Date): ReminderDue | null {
  const due = dueNow(hold);
  if (!due || hold.remindersSent >= greatestReminders) return null;
  const last = hold.lastReminderAt;
  if (now < due) {
    const since = hold.state === 'open' ? hold.openedAt : (hold.acknowledgedAt ?? hold.openedAt);
    const lead = Math.min(24 * hourMs, (due.getTime() - since.getTime()) / 2);
    const time = now.getTime() >= due.getTime() - lead;
    return time && hold.remindersSent === 0 ? { phase: 'before', escalate: false } : null;
  }
  if (!last || last < due) return { phase: 'overdue', escalate: true };
  if (now.getTime() - last.getTime() < overdueEveryMs) return null;
  const days = Math.floor((now.getTime() - due.getTime()) / overdueEveryMs);
  return { phase: 'overdue', escalate: days === 2 };
}
