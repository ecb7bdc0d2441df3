import nodemailer, { type SendMailOptions, type Transporter } from 'nodemailer';
import { type Mail } from '../models';
import { config } from '../config';
import { envelopeAddress, headerText } from './header-text';

/** What came of one try. */
export type Outcome =
  | { kind: 'accepted'; answer: string }
  /** Worth another try. */
  | { kind: 'refused'; answer: string }
  /** Handed over, but no answer came: it may have been taken. */
  | { kind: 'uncertain'; answer: string }
  /** The server said never (5xx to sender, recipient or content): the same again would get the same answer. */
  | { kind: 'never'; answer: string };

/** A try is over after this, whatever the server does; the lease on the mail is longer. */
export const greatestTrySeconds = 30;

interface SmtpError extends Error {
  code?: string;
  command?: string;
  response?: string;
  responseCode?: number;
}

/** One mail over one connection of its own: pooled connections go stale and re-queue behind our back. */
export async function deliver(mail: Mail): Promise<Outcome> {
  const progress = { contentAskedFor: false };
  let transport: Transporter | undefined;
  let cut: NodeJS.Timeout | undefined;
  try {
    transport = nodemailer.createTransport(transportOptions(progress));
    const tooLong = new Promise<never>((_, reject) => {
      cut = setTimeout(
        () => reject(new Error(`No answer within ${greatestTrySeconds} seconds.`)),
        greatestTrySeconds * 1000,
      );
    });
    const sent = (await Promise.race([transport.sendMail(message(mail)), tooLong])) as {
      response: string;
    };
    return { kind: 'accepted', answer: oneLine(sent.response) };
  } catch (error) {
    return judge(error as SmtpError, progress.contentAskedFor);
  } finally {
    clearTimeout(cut);
    transport?.close();
  }
}

function transportOptions(progress: { contentAskedFor: boolean }) {
  const quiet = () => undefined;
  return {
    url: config().SMTP_URL,
    pool: false,
    dnsTimeout: 5_000,
    connectionTimeout: 5_000,
    greetingTimeout: 5_000,
    socketTimeout: 10_000,
    disableFileAccess: true,
    disableUrlAccess: true,
    // The dialogue is listened to for one thing: whether the server asked for the content (354) before it fell silent.
    transactionLog: true,
    logger: {
      level: quiet,
      trace: quiet,
      info: quiet,
      warn: quiet,
      error: quiet,
      fatal: quiet,
      debug(entry: { tnx?: string }, text: unknown) {
        if (entry?.tnx === 'server' && /^354/.test(String(text))) progress.contentAskedFor = true;
      },
    },
  };
}

function message(mail: Mail): SendMailOptions {
  const address = envelopeAddress(mail.toEmail);
  return {
    from: config().MAIL_FROM,
    // No name: what somebody typed does not belong into an address.
    to: { name: '', address },
    subject: headerText(mail.subject),
    messageId: mail.messageId,
    ...(mail.inReplyTo ? { inReplyTo: mail.inReplyTo, references: [mail.inReplyTo] } : {}),
    date: mail.createdAt,
    text: mail.textBody,
    html: mail.htmlBody,
    // Other mail robots do not answer what is marked so (RFC 3834).
    headers: { 'Auto-Submitted': 'auto-generated' },
    attachments: mail.pictures.map(({ cid, fileName, mediaType, base64 }) => ({
      cid,
      filename: fileName,
      contentType: mediaType,
      content: Buffer.from(base64, 'base64'),
      contentDisposition: 'inline' as const,
    })),
  };
}

/**
 * Without an answer after the content was asked for, the server may have taken the mail. Anything that ends before that
 * moment is harmless to repeat.
 */
export function judge(error: SmtpError, contentAskedFor: boolean): Outcome {
  const answer = oneLine(error.response || error.message);
  const code = error.responseCode ?? 0;
  if (code >= 500 && /^(MAIL FROM|RCPT TO|DATA)$/.test(error.command ?? ''))
    return { kind: 'never', answer };
  return { kind: contentAskedFor && code === 0 ? 'uncertain' : 'refused', answer };
}

function oneLine(text: string): string {
  return text
    .replace(/[\p{Cc}]+/gu, ' ')
    .trim()
    .slice(0, 500);
}
