/** Long enough for every subject of ours, short enough that no server folds or cuts it. */
const greatestLength = 150;

/**
 * Text that may stand in a header: one line without control or direction characters. Line breaks in a name or a lot
 * number would otherwise start a header of somebody's choice.
 */
export function headerText(text: string): string {
  return text
    .replace(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}]+/gu, ' ')
    .replace(/\s+/g, ' ')
    .trim()
    .slice(0, greatestLength);
}

/** One plain address, or an error: lists, comments and display names never reach an envelope. */
export function envelopeAddress(address: string): string {
  if (!/^[^\s@<>(),;:"\\[\]]{1,64}@[A-Za-z0-9.-]{1,190}$/.test(address) || /\p{C}/u.test(address))
    throw new Error('This is not a single e-mail address.');
  return address;
}

/** The domain that mails of ours come from: `Quartzhold <no-reply@example.com>` gives `example.com`. */
export function senderDomain(mailFrom: string): string {
  return /@([A-Za-z0-9.-]+)/.exec(mailFrom)?.[1]?.toLowerCase() ?? 'quartzhold.invalid';
}
