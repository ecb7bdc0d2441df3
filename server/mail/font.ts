import { mkdtempSync, readFileSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { inflateSync } from 'node:zlib';

/**
 * A WOFF file as the plain font inside it: the rasteriser reads no WOFF. WOFF 1.0 (W3C, 2012) keeps the tables of an
 * sfnt font, each one compressed by zlib where that made it smaller.
 */
export function fontFromWoff(woff: Buffer): Buffer {
  if (woff.toString('latin1', 0, 4) !== 'wOFF') throw new Error('This is not a WOFF file.');
  const tableCount = woff.readUInt16BE(12);
  const directory = Buffer.alloc(12 + 16 * tableCount);
  woff.copy(directory, 0, 4, 8);
  const power = 2 ** Math.floor(Math.log2(tableCount));
  directory.writeUInt16BE(tableCount, 4);
  directory.writeUInt16BE(power * 16, 6);
  directory.writeUInt16BE(Math.log2(power), 8);
  directory.writeUInt16BE(tableCount * 16 - power * 16, 10);
  const pieces: Buffer[] = [directory];
  let offset = directory.length;
  for (let index = 0; index < tableCount; index++) {
    const entry = 44 + 20 * index;
    const [from, packedLength, length] = [4, 8, 12].map((at) => woff.readUInt32BE(entry + at)) as [
      number,
      number,
      number,
    ];
    const packed = woff.subarray(from, from + packedLength);
    const table = packedLength < length ? inflateSync(packed) : packed;
    const place = 12 + 16 * index;
    woff.copy(directory, place, entry, entry + 4);
    woff.copy(directory, place + 4, entry + 16, entry + 20);
    directory.writeUInt32BE(offset, place + 8);
    directory.writeUInt32BE(length, place + 12);
    const padding = Buffer.alloc((4 - (length % 4)) % 4);
    pieces.push(table, padding);
    offset += length + padding.length;
  }
  return Buffer.concat(pieces);
}

let path: string | undefined;

/** Source Sans 3 as a file the rasteriser can open; unpacked once in a process. */
export function fontFile(): string {
  if (path) return path;
  const woff = createRequire(import.meta.url).resolve(
    '@fontsource/source-sans-3/files/source-sans-3-latin-400-normal.woff',
  );
  const folder = mkdtempSync(join(tmpdir(), 'quartzhold-font-'));
  const file = join(folder, 'source-sans-3.ttf');
  writeFileSync(file, fontFromWoff(readFileSync(woff)));
  return (path = file);
}
