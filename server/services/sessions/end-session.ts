import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../../database/connection';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { NotFound } from '../../http/errors';
import { sessionMark } from './session-mark';

/** Deletes session rows of a person: all, all but one, or one. The rows are the sessions; without its row a cookie is nothing. */
export async function deleteSessions(
  transaction: Transaction,
  personId: string,
  which: { exceptSid?: string; sid?: string } = {},
): Promise<number> {
  const rows = await database().sequelize.query<{ sid: string }>(
    `DELETE FROM sessions WHERE sess -> 'passport' ->> 'user' = :personId
       AND (:exceptSid = '' OR sid <> :exceptSid) AND (:sid = '' OR sid = :sid) RETURNING sid`,
    {
      replacements: { personId, exceptSid: which.exceptSid ?? '', sid: which.sid ?? '' },
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  return rows.length;
}

/** Act `session.end`: sign out. The row goes first, so that a slow request in flight finds nothing to save to. */
export function signOut(actor: Actor, sid: string): Promise<void> {
  return act(actor, 'session.end', async (transaction) => {
    await deleteSessions(transaction, actor.id, { sid });
    return {
      result: undefined,
      entry: { recordType: 'person', recordId: actor.id, after: { ended: 'this session' } },
    };
  });
}

/** Act `session.end`: one of the own sessions by its mark, or `others`. */
export function endOwnSession(actor: Actor, currentSid: string, which: string): Promise<void> {
  return act(actor, 'session.end', async (transaction) => {
    let count: number;
    if (which === 'others') {
      count = await deleteSessions(transaction, actor.id, { exceptSid: currentSid });
    } else {
      const sid = (await sidsOf(transaction, actor.id)).find((own) => sessionMark(own) === which);
      if (!sid) throw new NotFound('This session');
      count = await deleteSessions(transaction, actor.id, { sid });
    }
    return {
      result: undefined,
      entry: {
        recordType: 'person',
        recordId: actor.id,
        after: { ended: which === 'others' ? 'all other sessions' : 'another session', count },
      },
    };
  });
}

async function sidsOf(transaction: Transaction, personId: string): Promise<string[]> {
  const rows = await database().sequelize.query<{ sid: string }>(
    `SELECT sid FROM sessions WHERE sess -> 'passport' ->> 'user' = :personId`,
    { replacements: { personId }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map((row) => row.sid);
}
