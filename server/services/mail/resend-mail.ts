import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict, NotAllowed, NotFound } from '../../http/errors';
import { wakeSender } from '../../mail/wake';
import { Mail } from '../../models';
import { resendRefusal, type ResendRefusal } from '../../policies/mail';

function refusalError(why: ResendRefusal): Error {
  switch (why) {
    case 'role':
      return new NotAllowed();
    case 'wiped':
      return new Conflict(
        'mail.wiped',
        'This mail carried a single-use link that is gone after sending. Issue a new invitation or reset instead.',
      );
    case 'being_sent':
      return new Conflict(
        'mail.being_sent',
        'This mail is being sent at this moment. Look again in a minute.',
      );
  }
}

/** Act `mail.resend`: another round of tries with the same text and Message-ID, so that a double can be told as one. */
export function resendMail(actor: Actor, id: string): Promise<void> {
  return act(actor, 'mail.resend', async (transaction) => {
    const mail = await Mail.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
    if (!mail) throw new NotFound('This mail');
    const refused = resendRefusal(actor, mail, new Date());
    if (refused) throw refusalError(refused);
    const before = { state: mail.state, tries: mail.attempts.length };
    await mail.update(
      {
        state: 'queued',
        urgency: 'at_once',
        tries: 0,
        uncertainTries: 0,
        nextTryAt: new Date(),
        leaseToken: null,
        leaseUntil: null,
      },
      { transaction },
    );
    transaction.afterCommit(() => wakeSender());
    return {
      result: undefined,
      entry: {
        recordType: 'mail',
        recordId: id,
        lotId: mail.lotId,
        before,
        after: { state: 'queued', messageId: mail.messageId },
      },
    };
  });
}
