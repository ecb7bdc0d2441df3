import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { expect, it } from 'vitest';
import { fontFile, fontFromWoff } from '../../../server/mail/font';
import { bandStripPicture, markPicture } from '../../../server/mail/pictures';
import { strip } from '../../support/held-lot';

/** OpenType 1.9, "Calculating checksums": sum of a table as big-endian 32-bit words. */
function checksum(table: Buffer): number {
  const padded = Buffer.concat([table, Buffer.alloc((4 - (table.length % 4)) % 4)]);
  let sum = 0;
  for (let at = 0; at < padded.length; at += 4) sum = (sum + padded.readUInt32BE(at)) >>> 0;
  return sum;
}

it('unpacks the font so that every table has the checksum its directory states', () => {
  const font = readFileSync(fontFile());
  const tableCount = font.readUInt16BE(4);
  expect(tableCount).toBeGreaterThan(8);
  const tags: string[] = [];
  for (let place = 12; place < 12 + 16 * tableCount; place += 16) {
    const tag = font.toString('latin1', place, place + 4);
    tags.push(tag);
    const table = Buffer.from(
      font.subarray(
        font.readUInt32BE(place + 8),
        font.readUInt32BE(place + 8) + font.readUInt32BE(place + 12),
      ),
    );
    // The head table's own total is left out of its checksum.
    if (tag === 'head') table.writeUInt32BE(0, 8);
    expect(checksum(table), tag).toBe(font.readUInt32BE(place + 4));
  }
  expect(tags).toEqual(expect.arrayContaining(['cmap', 'glyf', 'head', 'hmtx']));
});

it('refuses what is no WOFF', () => {
  const path = createRequire(import.meta.url).resolve(
    '@fontsource/source-sans-3/files/source-sans-3-latin-400-normal.woff2',
  );
  expect(() => fontFromWoff(readFileSync(path))).toThrow('not a WOFF');
});

it('draws the strip once for several people, and differently for another lot', () => {
  const picture = bandStripPicture(strip);
  expect(bandStripPicture(strip)).toBe(picture);
  expect(bandStripPicture({ ...strip, meanPpm: -5 })!.base64).not.toBe(picture!.base64);
  expect(markPicture()!.mediaType).toBe('image/png');
});
