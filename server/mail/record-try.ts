import { QueryTypes } from 'sequelize';
import { database, inTransaction } from '../database/connection';
import { Mail } from '../models';
import { greatestTries, greatestUncertainTries, waitSeconds } from './backoff';
import { type MailAttempt } from './message';
import { type Outcome } from './transport';

export const wipedText = 'The text carried a single-use link and was removed after sending.';

/** Writes down what a try came to. False when the lease was lost meanwhile: then somebody else's word counts. */
export async function recordTry(
  mail: Mail,
  outcome: Outcome,
  random = Math.random(),
): Promise<boolean> {
  const attempt: MailAttempt = {
    at: new Date().toISOString(),
    accepted: outcome.kind === 'accepted',
    answer: outcome.answer,
    ...(outcome.kind === 'uncertain' ? { uncertain: true } : {}),
  };
  const uncertainTries = mail.uncertainTries + (outcome.kind === 'uncertain' ? 1 : 0);
  const dead =
    outcome.kind === 'never' ||
    mail.tries >= greatestTries ||
    uncertainTries >= greatestUncertainTries;
  const state = outcome.kind === 'accepted' ? 'accepted' : dead ? 'dead' : 'refused';
  return inTransaction(async (transaction) => {
    const written = await database().sequelize.query(
      `UPDATE mails SET
         lease_token = NULL, lease_until = NULL, state = :state, uncertain_tries = :uncertainTries,
         last_answer = :answer, attempts = attempts || CAST(:attempt AS jsonb),
         accepted_at = CASE WHEN :state = 'accepted' THEN now() ELSE accepted_at END,
         next_try_at = CASE WHEN :state = 'refused' THEN now() + :wait * interval '1 second' END,
         text_body = CASE WHEN :state = 'accepted' AND secret THEN :wiped ELSE text_body END,
         html_body = CASE WHEN :state = 'accepted' AND secret THEN :wiped ELSE html_body END
       WHERE id = :id AND lease_token = :token
       RETURNING id`,
      {
        replacements: {
          id: mail.id,
          token: mail.leaseToken,
          state,
          uncertainTries,
          answer: attempt.answer,
          attempt: JSON.stringify([attempt]),
          wait: waitSeconds(mail.tries, random),
          wiped: wipedText,
        },
        type: QueryTypes.SELECT,
        transaction,
      },
    );
    if (written.length > 0 && state === 'accepted') {
      // What was told in a digest is told.
      await Mail.update(
        { state: 'accepted', acceptedAt: new Date(), lastAnswer: 'Sent in the daily digest.' },
        { where: { digestMailId: mail.id }, transaction },
      );
    }
    return written.length > 0;
  });
}
