import { Readable } from 'node:stream';
import { createGunzip } from 'node:zlib';
import { type Mapping } from '@shared/contract/uploads';
import { FileRefused } from './errors';
import { StrictUtf8 } from './strict-utf8';

type Encoding = Mapping['encoding'];

export const gzipMark = Buffer.from([0x1f, 0x8b]);

/** The encoding that a byte order mark announces, and its length. */
export function byteOrderMark(bytes: Uint8Array): { encoding: Encoding; length: number } | null {
  if (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf)
    return { encoding: 'utf-8', length: 3 };
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return { encoding: 'utf-16le', length: 2 };
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return { encoding: 'utf-16be', length: 2 };
  return null;
}

/** Unpacks gzip if the content says so; never more than `greatestBytes` come out. */
export async function* unpacked(
  source: AsyncIterable<Buffer>,
  greatestBytes: number,
): AsyncGenerator<Buffer> {
  const iterator = source[Symbol.asyncIterator]();
  const first = await atLeast(iterator, 2);
  const all = prepend(first, iterator);
  if (!first.subarray(0, 2).equals(gzipMark)) {
    yield* all;
    return;
  }
  const gunzip = createGunzip({ chunkSize: 256 * 1024 });
  const input = Readable.from(all, { objectMode: false });
  input.on('error', (error) => gunzip.destroy(error));
  input.pipe(gunzip);
  let total = 0;
  try {
    for await (const chunk of gunzip as AsyncIterable<Buffer>) {
      total += chunk.length;
      if (total > greatestBytes)
        throw new FileRefused(
          'file.unpacks_too_large',
          `Unpacked, the file is larger than ${Math.round(greatestBytes / 1024 / 1024)} MiB. Split it and upload the parts.`,
        );
      yield chunk;
    }
  } catch (error) {
    if (error instanceof Error && 'code' in error && String(error.code).startsWith('Z_'))
      throw new FileRefused(
        'file.gzip_damaged',
        'The compressed file is damaged or cut short. Compress it again and upload it once more.',
      );
    throw error;
  } finally {
    input.destroy();
    gunzip.destroy();
  }
}

/** Bytes in any declared encoding become UTF-8 without a byte order mark; a mark in the file outranks the declaration. */
export async function* asUtf8(
  source: AsyncIterable<Buffer>,
  declared: Encoding,
): AsyncGenerator<Buffer> {
  const iterator = source[Symbol.asyncIterator]();
  const first = await atLeast(iterator, 3);
  const mark = byteOrderMark(first);
  const encoding = mark?.encoding ?? declared;
  const all = prepend(first.subarray(mark?.length ?? 0), iterator);
  if (encoding === 'utf-8') {
    const check = new StrictUtf8();
    for await (const chunk of all) {
      const sure = check.push(chunk);
      if (sure.length) yield sure;
    }
    check.end();
    return;
  }
  const decoder = new TextDecoder(encoding, { fatal: true, ignoreBOM: true });
  try {
    for await (const chunk of all) {
      const text = decoder.decode(chunk, { stream: true });
      if (text) yield Buffer.from(text, 'utf8');
    }
    const rest = decoder.decode();
    if (rest) yield Buffer.from(rest, 'utf8');
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
    throw new FileRefused(
      'file.encoding',
      `The file is not ${encoding}. Choose another encoding in the check step.`,
    );
  }
}

async function atLeast(iterator: AsyncIterator<Buffer>, length: number): Promise<Buffer> {
  let bytes: Buffer = Buffer.alloc(0);
  while (bytes.length < length) {
    const step = await iterator.next();
    if (step.done) break;
    bytes = bytes.length ? Buffer.concat([bytes, step.value]) : step.value;
  }
  return bytes;
}

async function* prepend(first: Buffer, iterator: AsyncIterator<Buffer>): AsyncGenerator<Buffer> {
  try {
    if (first.length) yield first;
    for (let step = await iterator.next(); !step.done; step = await iterator.next())
      yield step.value;
  } finally {
    await iterator.return?.();
  }
}
