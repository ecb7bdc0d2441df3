/** What the fake does with the mails it is handed. */
export const fakeModes = {
  accept: 'accept',
  refuse_for_now: 'refuse for now (451)',
  refuse_for_good: 'refuse for good (550)',
  drop_before: 'hang up before taking a mail',
  drop_after: 'take a mail, then hang up without an answer',
  hang: 'never greet',
  broken_tls: 'offer TLS with a certificate nobody trusts',
} as const;
export type FakeMode = keyof typeof fakeModes;

export interface MailFakeBehaviour {
  mode: FakeMode;
  /** Waits so long before each answer to a mail. */
  delayMs: number;
  /** For how many more mails; then it accepts again. Null: until told otherwise. */
  times: number | null;
}

export const wellBehaved: MailFakeBehaviour = { mode: 'accept', delayMs: 0, times: null };

/** Reads what a form or a test sent; throws a sentence naming what is wrong. */
export function readBehaviour(input: Record<string, unknown>): MailFakeBehaviour {
  const mode = String(input.mode ?? 'accept');
  if (!Object.hasOwn(fakeModes, mode))
    throw new Error(`mode must be one of ${Object.keys(fakeModes).join(', ')}.`);
  const delayMs = Number(input.delayMs ?? 0);
  if (!(delayMs >= 0 && delayMs <= 60_000)) throw new Error('delayMs must lie from 0 to 60000.');
  const given = input.times;
  const times = given === undefined || given === null || given === '' ? null : Number(given);
  if (times !== null && !(Number.isInteger(times) && times > 0))
    throw new Error('times must be a whole number from 1, or left out.');
  return { mode: mode as FakeMode, delayMs, times };
}
