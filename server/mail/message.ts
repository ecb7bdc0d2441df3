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
}
