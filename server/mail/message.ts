/** A picture shown inside an HTML mail by its content id. */
export interface MailPicture {
  cid: string;
  fileName: string;
  mediaType: string;
  base64: string;
}

/** One try of sending: what the mail server said. */
export interface MailAttempt {
  at: string;
  accepted: boolean;
  answer: string;
  /** The mail was handed over but no answer came: another try may deliver it twice. */
  uncertain?: boolean;
}

/** What a mail says, before it is set as plain text and as HTML. */
export interface MailContent {
  subject: string;
  paragraphs: string[];
  facts: [label: string, value: string][];
  link: { label: string; url: string } | null;
  /** One sentence: why this person gets this mail. */
  why: string;
  /** The band strip in words, and the content id of its picture if it could be drawn. */
  strip: { sentence: string; cid: string | null } | null;
  markCid: string | null;
  choiceUrl: string;
}
