import { setTimeout as wait } from 'node:timers/promises';
import { act } from '../../history/act';
import { system } from '../../http/actor';
import { countAttempt, resetCounters } from '../sign-in/attempts';
import { personByEmail } from '../sign-in/sign-in';
import { mailLink } from './mail-link';

/** Longer than the work takes, so that the answer comes at the same moment whether or not there was any to do. */
const answerAfterMs = 300;

/** Act `password.reset_request`: mails a link if the address is somebody's; tells the asker nothing either way. */
export async function requestReset(email: string, address: string): Promise<void> {
  const answer = wait(answerAfterMs);
  await countAttempt(resetCounters(email, address));
  const person = await personByEmail(email);
  const known = person !== null && person.state !== 'disabled';
  await act(system, 'password.reset_request', async (transaction) => {
    const purpose = known
      ? await mailLink(transaction, person, 'by somebody on the sign-in page')
      : null;
    return {
      result: undefined,
      entry: {
        recordType: 'person',
        recordId: person?.id ?? 'unknown',
        after: { mailed: purpose },
      },
    };
  });
  await answer;
}
