import { withClient } from '../../server/database/roles';
import { Mail } from '../../server/models';
import { type Api } from './api';

/** What an operator could do to the database; the application's role may not. */
export function asOperator(api: Api, sql: string, values: unknown[] = []) {
  return withClient(
    api.testDatabase.adminUrl,
    async (client) => (await client.query(sql, values)).rows,
  );
}

/** Moves every waiting time into the past, as if so many minutes had gone by. */
export async function minutesPass(api: Api, minutes: number): Promise<void> {
  const ms = minutes * 60_000;
  await withClient(api.testDatabase.adminUrl, (client) =>
    client.query(`
      UPDATE rate_limits SET expire = expire - ${ms};
      UPDATE people SET signing_locked_until = signing_locked_until - make_interval(mins => ${minutes});
      UPDATE person_links SET expires_at = expires_at - make_interval(mins => ${minutes});
      UPDATE sessions SET sess = (sess::jsonb
        || jsonb_build_object('startedAt', (sess ->> 'startedAt')::bigint - ${ms})
        || jsonb_build_object('lastUsedAt', (sess ->> 'lastUsedAt')::bigint - ${ms}))::json;
    `),
  );
}

/** Mails to an address, newest first. */
export function mailsTo(email: string): Promise<Mail[]> {
  return Mail.findAll({ where: { toEmail: email }, order: [['createdAt', 'DESC']] });
}

/** The token of the newest single-use link mailed to an address. */
export async function newestToken(email: string): Promise<string> {
  for (const mail of await mailsTo(email)) {
    const token = /\/links\/([\w-]+)/.exec(mail.textBody)?.[1];
    if (token) return token;
  }
  throw new Error(`No link was mailed to ${email}.`);
}
