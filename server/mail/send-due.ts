import { claimDueMail, freeAbandonedMails } from './claim';
import { recordTry } from './record-try';
import { deliver } from './transport';

/** Connections to the mail server at a time. */
const atATime = 4;

/** Sends whatever is due now, a few at a time, and returns how many tries were made. */
export async function sendDueMails(): Promise<number> {
  await freeAbandonedMails();
  const counts = await Promise.all(Array.from({ length: atATime }, sendUntilNoneIsDue));
  return counts.reduce((sum, count) => sum + count, 0);
}

async function sendUntilNoneIsDue(): Promise<number> {
  for (let count = 0; ; count++) {
    const mail = await claimDueMail();
    if (!mail) return count;
    await recordTry(mail, await deliver(mail));
  }
}
