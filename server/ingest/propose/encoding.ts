import { isUtf8 } from 'node:buffer';
import { type Mapping } from '@shared/contract/uploads';
import { byteOrderMark } from '../decode';
import { FileRefused } from '../errors';
import { unfinished } from '../strict-utf8';

export interface EncodingProposal {
  encoding: Mapping['encoding'];
  /** Neither a mark nor the bytes decide. */
  sure: boolean;
}

/** A byte order mark decides, then strict UTF-8; what is neither is asked, with Windows-1252 proposed. */
export function proposeEncoding(bytes: Buffer, complete: boolean): EncodingProposal {
  const mark = byteOrderMark(bytes);
  if (mark) return { encoding: mark.encoding, sure: true };
  const wide = looksWide(bytes);
  if (wide) return { encoding: wide, sure: true };
  // The prefix may end within a character.
  const whole = complete ? bytes : bytes.subarray(0, bytes.length - unfinished(bytes));
  if (isUtf8(whole)) {
    refuseNul(bytes);
    return { encoding: 'utf-8', sure: true };
  }
  refuseNul(bytes);
  return { encoding: 'windows-1252', sure: false };
}

function refuseNul(bytes: Buffer): void {
  let count = 0;
  for (let at = bytes.indexOf(0); at !== -1 && count < 1000; at = bytes.indexOf(0, at + 1))
    count += 1;
  // A stray NUL costs its row; a file full of them is no text.
  if (count > 20 && count > bytes.length / 100)
    throw new FileRefused(
      'file.not_text',
      'This is not a text file. Save the readings as CSV and upload that.',
    );
}

/** UTF-16 without a mark: every other byte of plain text is zero. */
function looksWide(bytes: Buffer): 'utf-16le' | 'utf-16be' | null {
  const length = Math.min(bytes.length, 4000) & ~1;
  if (length < 20) return null;
  let even = 0;
  let odd = 0;
  for (let i = 0; i < length; i += 2) {
    if (bytes[i] === 0) even += 1;
    if (bytes[i + 1] === 0) odd += 1;
  }
  if (odd > 0.4 * (length / 2) && even < 0.05 * (length / 2)) return 'utf-16le';
  if (even > 0.4 * (length / 2) && odd < 0.05 * (length / 2)) return 'utf-16be';
  return null;
}

export function decodePrefix(bytes: Buffer, encoding: Mapping['encoding']): string {
  const mark = byteOrderMark(bytes);
  const text = new TextDecoder(mark?.encoding ?? encoding).decode(
    bytes.subarray(mark?.length ?? 0),
    { stream: true },
  );
  return text;
}
