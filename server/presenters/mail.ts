import { type z } from 'zod';
import { type Mail as MailView, type MailRow } from '@shared/contract/mail';
import { type Mail } from '../models';

const secretText =
  'This mail carries a single-use link, so its text is shown to nobody but the one it goes to.';

export function presentMailRow(mail: Mail): MailRow {
  return {
    id: mail.id,
    messageId: mail.messageId,
    kind: mail.kind,
    to: { name: mail.toName, email: mail.toEmail },
    subject: mail.subject,
    state: mail.state,
    // All that were made, also those before somebody had it sent again.
    tries: mail.attempts.length,
    lastAnswer: mail.lastAnswer,
    createdAt: mail.createdAt.toISOString(),
    nextTryAt: mail.nextTryAt?.toISOString() ?? null,
    acceptedAt: mail.acceptedAt?.toISOString() ?? null,
    holdId: mail.holdId,
    lotId: mail.lotId,
  };
}

export function presentMail(mail: Mail): z.infer<typeof MailView> {
  return {
    ...presentMailRow(mail),
    text: mail.secret ? secretText : mail.textBody,
    html: mail.secret ? `<p>${secretText}</p>` : withPictures(mail),
    why: mail.why,
    attempts: mail.attempts.map(({ at, accepted, answer }) => ({ at, accepted, answer })),
  };
}

/** Pictures are put into the HTML itself, since a browser knows no content ids. */
function withPictures(mail: Mail): string {
  return mail.pictures.reduce(
    (html, { cid, mediaType, base64 }) =>
      html.replaceAll(`src="cid:${cid}"`, `src="data:${mediaType};base64,${base64}"`),
    mail.htmlBody,
  );
}
