import fc from 'fast-check';
import Papa from 'papaparse';
import { describe, expect, it, vi } from 'vitest';
import { RecordReader } from '../../../server/ingest/record-reader';
import { cutInto } from '../../support/ingest-memory';

function read(text: string, delimiter = ',', chunkBytes = 1 << 20) {
  const records: string[][] = [];
  const reader = new RecordReader(delimiter.charCodeAt(0), {
    record(bytes, bounds, count) {
      records.push(
        Array.from({ length: count }, (_, i) =>
          bytes.toString('utf8', bounds[2 * i], bounds[2 * i + 1]),
        ),
      );
    },
    broken() {
      throw new Error('broken');
    },
  });
  for (const piece of cutInto(Buffer.from(text), chunkBytes)) reader.push(piece);
  reader.end();
  return records;
}

vi.setConfig({ testTimeout: 60_000 });

describe('the byte-level reader', () => {
  it('reads well-formed files as papaparse does', () => {
    const field = fc.oneof(
      fc.constantFrom(
        '',
        'A',
        '007',
        '-1.5',
        'a b',
        'é😀',
        'x"y',
        'a,b',
        'line\nend',
        'cr\rlf\r\n',
        '"',
      ),
      fc.string({ maxLength: 12 }).map((s) => s.replaceAll('\0', '')),
    );
    fc.assert(
      fc.property(
        fc.array(fc.array(field, { minLength: 2, maxLength: 6 }), { minLength: 1, maxLength: 12 }),
        fc.boolean(),
        fc.integer({ min: 1, max: 200 }),
        (rows, quotes, chunkBytes) => {
          const text = Papa.unparse(rows, { newline: '\n', quotes });
          const expected = Papa.parse<string[]>(text, { delimiter: ',', newline: '\n' }).data;
          expect(read(text, ',', chunkBytes)).toEqual(expected);
        },
      ),
      { numRuns: 1000 },
    );
  });

  it('passes over a line of 50 MB in little memory', () => {
    const broken: [number, string][] = [];
    const records: number[] = [];
    const reader = new RecordReader(44, {
      record: (_bytes, _bounds, _count, line) => records.push(line),
      broken: (_bytes, _start, _end, line, rule) => broken.push([line, rule]),
    });
    const chunk = Buffer.alloc(64 * 1024, 'x');
    reader.push(Buffer.from('a,b\n'));
    const before = process.memoryUsage().arrayBuffers;
    for (let i = 0; i < 800; i += 1) reader.push(chunk);
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(8 * 1024 * 1024);
    reader.push(Buffer.from('\nc,d\n'));
    reader.end();
    expect(broken).toEqual([[2, 'line.too_long']]);
    expect(records).toEqual([1, 3]);
  });
});
