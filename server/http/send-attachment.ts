import { type Response } from 'express';

/** A file that somebody sent us, as a download. Never shown inside a page of ours, whatever it contains. */
export function sendAttachment(
  response: Response,
  file: { fileName: string; bytes: Buffer },
): void {
  response.attachment(file.fileName);
  response.set({
    'Content-Type': 'application/octet-stream',
    'Content-Security-Policy': "sandbox; default-src 'none'",
    'X-Content-Type-Options': 'nosniff',
  });
  response.send(file.bytes);
}
