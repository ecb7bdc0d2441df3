import PostalMime, { type Email } from 'postal-mime';

/** A mail the fake has taken, as a mail program would show it. */
export interface Letter {
  number: number;
  at: string;
  /** Envelope: where it was really handed to. */
  from: string;
  to: string[];
  subject: string;
  messageId: string;
  inReplyTo: string | null;
  references: string | null;
  headers: { key: string; value: string }[];
  text: string;
  html: string;
  pictures: { cid: string; fileName: string; mediaType: string; base64: string }[];
  raw: string;
}

const greatestCount = 500;

/** The newest mails, in memory only. */
export class Letters {
  private list: Letter[] = [];
  private lastNumber = 0;

  async take(raw: Buffer, envelope: { from: string; to: string[] }): Promise<Letter> {
    const email = await PostalMime.parse(raw);
    const letter = { ...this.shape(email, raw), ...envelope, number: ++this.lastNumber };
    this.list.push(letter);
    if (this.list.length > greatestCount) this.list.shift();
    return letter;
  }

  private shape(email: Email, raw: Buffer): Omit<Letter, 'number' | 'from' | 'to'> {
    return {
      at: new Date().toISOString(),
      subject: email.subject ?? '',
      messageId: email.messageId ?? '',
      inReplyTo: email.inReplyTo ?? null,
      references: email.references ?? null,
      headers: email.headers.map(({ key, value }) => ({ key, value })),
      text: email.text ?? '',
      html: email.html ?? '',
      pictures: email.attachments.map((attachment) => ({
        cid: (attachment.contentId ?? '').replace(/^<|>$/g, ''),
        fileName: attachment.filename ?? '',
        mediaType: attachment.mimeType,
        base64: Buffer.from(attachment.content as ArrayBuffer).toString('base64'),
      })),
      raw: raw.toString('latin1'),
    };
  }

  /** Newest first. */
  all(): Letter[] {
    return [...this.list].reverse();
  }

  find(number: number): Letter | undefined {
    return this.list.find((letter) => letter.number === number);
  }

  clear(): void {
    this.list = [];
  }
}
