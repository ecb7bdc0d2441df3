import Papa from 'papaparse';
import { limits } from './limits';

/** Fields of one record: bytes[bounds[2i], bounds[2i+1]) for i below `count`. */
export interface RecordSink {
  record(bytes: Buffer, bounds: Int32Array, count: number, fileLine: number): void;
  /** A record that cannot be cut into fields; bytes[start, end) is what was found. */
  broken(
    bytes: Buffer,
    start: number,
    end: number,
    fileLine: number,
    rule: 'line.too_long' | 'quotes',
  ): void;
}

const LF = 10;
const CR = 13;
const QUOTE = 34;
const SPACE = 32;
/** Small chunks are gathered to blocks of this size, so that one-byte chunks cost no more than large ones. */
const BLOCK = 64 * 1024;

/**
 * Cuts UTF-8 bytes into records and fields. Lines end in LF, CRLF or CR, mixed as they come; a field that begins with a
 * quote ends at its closing quote, line ends included. A quote that is never closed, or closed in the middle of a
 * field, costs its own line and nothing after it. File line numbers count every line of the file from 1.
 *
 * Fields with doubled quotes are handed to papaparse as whole records, never as chunks of a stream: so it can neither
 * grow without bound on a lost quote nor guess line ends. The result is the same for every way of cutting the file.
 */
export class RecordReader {
  private pending = Buffer.allocUnsafe(BLOCK);
  private pendingLength = 0;
  private line = 1;
  /** A CR ended the last record: an LF that follows belongs to it. */
  private afterCr = false;
  /** Inside a record that is too long: skip to its end. */
  private skipping = false;
  private readonly bounds = new Int32Array(2 * (limits.columns + 1));

  constructor(
    private readonly delimiter: number,
    private readonly sink: RecordSink,
  ) {}

  push(chunk: Buffer): void {
    if (this.pendingLength === 0 && chunk.length >= BLOCK) {
      this.keep(chunk, this.read(chunk, false));
      return;
    }
    this.append(chunk);
    if (this.pendingLength < 2 * BLOCK && chunk.length < BLOCK) return;
    const whole = this.pending.subarray(0, this.pendingLength);
    this.pendingLength = 0;
    // What is read may be referred to by the sink only during the call, so the buffer can be used again.
    this.keep(whole, this.read(whole, false));
  }

  end(): void {
    this.read(this.pending.subarray(0, this.pendingLength), true);
    this.pendingLength = 0;
  }

  private append(chunk: Buffer): void {
    const needed = this.pendingLength + chunk.length;
    if (needed > this.pending.length) {
      const larger = Buffer.allocUnsafe(Math.max(needed, 2 * this.pending.length));
      this.pending.copy(larger, 0, 0, this.pendingLength);
      this.pending = larger;
    }
    chunk.copy(this.pending, this.pendingLength);
    this.pendingLength = needed;
  }

  private keep(block: Buffer, from: number): void {
    const rest = block.subarray(from);
    if (rest.buffer === this.pending.buffer && rest.byteOffset !== this.pending.byteOffset) {
      this.pending.copyWithin(
        0,
        rest.byteOffset - this.pending.byteOffset,
        rest.byteOffset - this.pending.byteOffset + rest.length,
      );
      this.pendingLength = rest.length;
    } else if (rest.buffer !== this.pending.buffer) {
      this.append(rest);
    } else {
      this.pendingLength = rest.length;
    }
  }

  /** Reads whole records and answers where the first unfinished one begins. */
  private read(bytes: Buffer, last: boolean): number {
    const { delimiter, bounds, sink } = this;
    const length = bytes.length;
    const mostBounds = bounds.length;
    let at = 0;
    if (this.skipping) {
      at = this.skipToLineEnd(bytes, 0);
      if (at === -1) return length;
    }
    while (at < length) {
      if (this.afterCr) {
        this.afterCr = false;
        if (bytes[at] === LF) {
          at += 1;
          continue;
        }
      }
      const start = at;
      let fieldStart = at;
      let filled = 0;
      let count = 0;
      let byte = 0;
      let quoted = false;
      let p = at;
      for (; p < length; p += 1) {
        byte = bytes[p]!;
        if (byte === delimiter) {
          if (filled < mostBounds) {
            bounds[filled] = fieldStart;
            bounds[filled + 1] = p;
            filled += 2;
          }
          count += 1;
          fieldStart = p + 1;
        } else if (byte === LF || byte === CR) {
          break;
        } else if (byte === QUOTE && p === fieldStart) {
          quoted = true;
          break;
        }
      }
      if (quoted) {
        const next = this.readQuoted(bytes, start, last);
        if (next === -1) return start;
        at = next;
        continue;
      }
      if (p === length && !last) {
        if (p - start <= limits.recordBytes) return start;
        sink.broken(bytes, start, p, this.line, 'line.too_long');
        this.skipping = true;
        return length;
      }
      if (p - start > limits.recordBytes) {
        sink.broken(bytes, start, p, this.line, 'line.too_long');
      } else {
        if (filled < mostBounds) {
          bounds[filled] = fieldStart;
          bounds[filled + 1] = p;
        }
        sink.record(bytes, bounds, count + 1, this.line);
      }
      this.line += 1;
      this.afterCr = byte === CR && p < length;
      at = p + 1;
    }
    return length;
  }

  private skipToLineEnd(bytes: Buffer, from: number): number {
    let p = from;
    while (p < bytes.length && bytes[p] !== LF && bytes[p] !== CR) p += 1;
    if (p === bytes.length) return -1;
    this.skipping = false;
    this.line += 1;
    this.afterCr = bytes[p] === CR;
    return p + 1;
  }

  /** Answers where the next record begins, or -1 when more bytes are needed. */
  private readQuoted(bytes: Buffer, start: number, last: boolean): number {
    const { delimiter, bounds, sink } = this;
    const length = bytes.length;
    const greatest = Math.min(length, start + limits.recordBytes + 1);
    let p = start;
    let count = 0;
    let doubled = false;
    let lineEnds = 0;
    for (;;) {
      let from = p;
      let to: number;
      if (p < greatest && bytes[p] === QUOTE) {
        from = p + 1;
        p = from;
        for (;;) {
          while (p < greatest && bytes[p] !== QUOTE) {
            if (bytes[p] === LF || (bytes[p] === CR && bytes[p + 1] !== LF)) lineEnds += 1;
            p += 1;
          }
          if (p >= greatest) return this.unclosed(bytes, start, last, length);
          // Whether this quote closes the field or is the first of two needs one byte more.
          if (p + 1 >= length && !last)
            return p + 1 > start + limits.recordBytes
              ? this.firstLineBroken(bytes, start, last)
              : -1;
          if (bytes[p + 1] !== QUOTE || p + 1 >= length) break;
          doubled = true;
          p += 2;
        }
        to = p;
        p += 1;
        while (p < greatest && bytes[p] === SPACE) p += 1;
      } else {
        while (p < greatest && bytes[p] !== delimiter && bytes[p] !== LF && bytes[p] !== CR) p += 1;
        to = p;
      }
      if (p >= greatest && !(last && p === length))
        return this.unclosed(bytes, start, last, length);
      if (2 * count < bounds.length) {
        bounds[2 * count] = from;
        bounds[2 * count + 1] = to;
      }
      count += 1;
      const byte = p < length ? bytes[p]! : LF;
      if (byte === delimiter && p < length) {
        p += 1;
        continue;
      }
      if (byte !== LF && byte !== CR) return this.firstLineBroken(bytes, start, last);
      if (p - start > limits.recordBytes) return this.firstLineBroken(bytes, start, last);
      if (!doubled) sink.record(bytes, bounds, count, this.line);
      else this.byPapaparse(bytes, start, p);
      this.line += 1 + lineEnds;
      this.afterCr = byte === CR && p < length;
      return p + 1;
    }
  }

  private unclosed(bytes: Buffer, start: number, last: boolean, length: number): number {
    if (!last && length - start <= limits.recordBytes) return -1;
    return this.firstLineBroken(bytes, start, last);
  }

  /** The line on which a faulty quote stands is refused; reading goes on with the next line. */
  private firstLineBroken(bytes: Buffer, start: number, last: boolean): number {
    let p = start;
    while (p < bytes.length && bytes[p] !== LF && bytes[p] !== CR) p += 1;
    if (p === bytes.length && !last) {
      if (p - start <= limits.recordBytes) return -1;
      this.sink.broken(bytes, start, p, this.line, 'line.too_long');
      this.skipping = true;
      return bytes.length;
    }
    const rule = p - start > limits.recordBytes ? 'line.too_long' : 'quotes';
    this.sink.broken(bytes, start, p, this.line, rule);
    this.line += 1;
    this.afterCr = bytes[p] === CR;
    return p + 1;
  }

  private byPapaparse(bytes: Buffer, start: number, end: number): void {
    const { data, errors } = Papa.parse<string[]>(bytes.toString('utf8', start, end), {
      delimiter: String.fromCharCode(this.delimiter),
      newline: '\n',
    });
    const fields = data[0];
    if (data.length !== 1 || !fields || errors.some((error) => error.type === 'Quotes')) {
      this.sink.broken(bytes, start, end, this.line, 'quotes');
      return;
    }
    const parts = fields.map((field) => Buffer.from(field, 'utf8'));
    let at = 0;
    parts.slice(0, limits.columns + 1).forEach((part, index) => {
      this.bounds[2 * index] = at;
      at += part.length;
      this.bounds[2 * index + 1] = at;
    });
    this.sink.record(Buffer.concat(parts), this.bounds, fields.length, this.line);
  }
}
