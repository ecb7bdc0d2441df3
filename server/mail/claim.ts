import { randomUUID } from 'node:crypto';
import { QueryTypes } from 'sequelize';
import { database } from '../database/connection';
import { Mail } from '../models';
import { greatestTries, greatestUncertainTries } from './backoff';
import { greatestTrySeconds } from './transport';

/** Longer than any try may last, so that no two senders ever hold the same mail. */
const leaseSeconds = greatestTrySeconds * 3;

/**
 * Takes one due mail for a try, or null. The claim is one short statement of its own; the sending happens outside any
 * transaction, and its result is written only by whoever still holds the lease.
 */
export async function claimDueMail(): Promise<Mail | null> {
  const [claimed] = await database().sequelize.query(
    `UPDATE mails SET lease_token = :token, lease_until = now() + :lease * interval '1 second', tries = tries + 1
     WHERE id = (
       SELECT id FROM mails
       WHERE state IN ('queued', 'refused') AND next_try_at <= now() AND lease_token IS NULL
       ORDER BY next_try_at
       LIMIT 1 FOR UPDATE SKIP LOCKED
     )
     RETURNING *`,
    {
      replacements: { token: randomUUID(), lease: leaseSeconds },
      type: QueryTypes.SELECT,
      model: Mail,
      mapToModel: true,
    },
  );
  return claimed ?? null;
}

/**
 * Frees mails whose sender died in the middle of a try. Nobody knows whether the server had taken them, so the try
 * counts as uncertain.
 */
export async function freeAbandonedMails(): Promise<void> {
  await database().sequelize.query(
    `UPDATE mails SET
       lease_token = NULL, lease_until = NULL,
       uncertain_tries = uncertain_tries + 1,
       last_answer = :answer,
       attempts = attempts || jsonb_build_array(jsonb_build_object(
         'at', to_char(now() AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"'),
         'accepted', false, 'uncertain', true, 'answer', :answer)),
       state = CASE WHEN uncertain_tries + 1 >= :uncertainMax OR tries >= :triesMax THEN 'dead' ELSE 'refused' END,
       next_try_at = CASE WHEN uncertain_tries + 1 >= :uncertainMax OR tries >= :triesMax THEN NULL ELSE now() END
     WHERE lease_until < now()`,
    {
      replacements: {
        answer: 'The sender stopped during this try; whether the mail was taken is not known.',
        uncertainMax: greatestUncertainTries,
        triesMax: greatestTries,
      },
    },
  );
}
