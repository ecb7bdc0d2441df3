import { isAscii, isUtf8 } from 'node:buffer';
import { FileRefused } from './errors';

/**
 * Lets through what is UTF-8 to the last byte and refuses the file at the first byte that is not. A character cut by
 * the edge of a chunk is held back until its rest arrives.
 */
export class StrictUtf8 {
  private held: Buffer = Buffer.alloc(0);
  private passedBytes = 0;

  push(chunk: Buffer): Buffer {
    if (this.held.length === 0 && isAscii(chunk)) {
      this.passedBytes += chunk.length;
      return chunk;
    }
    const whole = this.held.length ? Buffer.concat([this.held, chunk]) : chunk;
    const edge = whole.length - unfinished(whole);
    const sure = whole.subarray(0, edge);
    if (!isUtf8(sure)) this.refuse(sure);
    this.held = Buffer.from(whole.subarray(edge));
    this.passedBytes += sure.length;
    return sure;
  }

  end(): void {
    if (this.held.length) this.refuse(this.held);
  }

  private refuse(block: Buffer): never {
    const byte = this.passedBytes + validLength(block) + 1;
    throw new FileRefused(
      'file.encoding',
      `Byte ${byte} of the text is not UTF-8. Choose the encoding in the check step, for example Windows-1252.`,
    );
  }
}

/** Bytes at the end that begin a character without finishing it. */
export function unfinished(bytes: Buffer): number {
  for (let back = 1; back <= Math.min(3, bytes.length); back += 1) {
    const byte = bytes[bytes.length - back]!;
    if (byte < 0x80) return 0;
    if (byte >= 0xc0) {
      const needs = byte >= 0xf0 ? 4 : byte >= 0xe0 ? 3 : 2;
      return needs > back ? back : 0;
    }
  }
  return 0;
}

/** Length of the longest valid beginning. */
function validLength(block: Buffer): number {
  let low = 0;
  let high = block.length;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    const part = block.subarray(0, middle);
    if (isUtf8(part.subarray(0, middle - unfinished(part)))) low = middle;
    else high = middle - 1;
  }
  return low - unfinished(block.subarray(0, low));
}
