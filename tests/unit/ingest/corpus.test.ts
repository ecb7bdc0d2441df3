import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { corpusCases } from '../../ingest/cases';
import { cutInto, ingest } from '../../support/ingest-memory';

// A few hundred readings of a file each: slow only on a busy machine.
vi.setConfig({ testTimeout: 60_000 });
const cases = corpusCases();

describe('the corpus', () => {
  it('has more than sixty files, each with a name of its own', () => {
    expect(cases.length).toBeGreaterThan(60);
    expect(new Set(cases.map(({ name }) => name)).size).toBe(cases.length);
  });

  it.each(cases)('$name', async ({ bytes, taken, refused, fails, mapping }) => {
    const outcome = await ingest([bytes], mapping);
    expect(outcome.fails).toBe(fails ?? null);
    if (fails) return;
    if (taken) expect(outcome.serials).toEqual(taken);
    expect(outcome.refused).toEqual(refused ?? []);
    const [rows, took, refusedCount] = outcome.counts;
    expect(rows).toBe(took + refusedCount);
    expect(refusedCount).toBe((refused ?? []).length);
  });

  it.each(cases.filter(({ bytes }) => bytes.length < 4000))(
    '$name: cut at every byte, and in one-byte chunks, gives the same',
    async ({ bytes, mapping }) => {
      const whole = await ingest([bytes], mapping);
      expect(await ingest(cutInto(bytes, 1), mapping)).toEqual(whole);
      for (let cut = 1; cut < bytes.length; cut += 1)
        expect(await ingest([bytes.subarray(0, cut), bytes.subarray(cut)], mapping)).toEqual(whole);
    },
  );

  it.each(cases.filter(({ bytes }) => bytes.length >= 4000))(
    '$name: large and small chunks give the same',
    async ({ bytes, mapping }) => {
      const whole = await ingest([bytes], mapping);
      for (const size of [997, 65_535, 65_536, 131_072])
        expect(await ingest(cutInto(bytes, size), mapping)).toEqual(whole);
    },
  );
});

describe('any file at all', () => {
  const piece = fc.constantFrom(
    ',', '"', '""', '\n', '\r', '\r\n', ' ', 'A', 'B1', '25', '16000001.5', '-', '.', '=', "'", '\0', 'é', '😀', '#', '1e7', ';', '\t',
  ); // prettier-ignore
  const header = 'serial,temperature_c,frequency_hz,measured_at\n';

  it('is read the same however it is cut, and its counts add up', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.array(piece, { maxLength: 120 }),
        fc.array(fc.integer({ min: 1, max: 40 }), { minLength: 1, maxLength: 30 }),
        async (pieces, sizes) => {
          const bytes = Buffer.from(header + pieces.join(''), 'utf8');
          const whole = await ingest([bytes]);
          const chunks: Buffer[] = [];
          for (let at = 0, i = 0; at < bytes.length; i += 1) {
            const size = sizes[i % sizes.length]!;
            chunks.push(bytes.subarray(at, at + size));
            at += size;
          }
          expect(await ingest(chunks)).toEqual(whole);
          expect(whole.counts[0]).toBe(whole.counts[1] + whole.counts[2]);
        },
      ),
      { numRuns: 400 },
    );
  });

  it('never throws on random bytes', async () => {
    await fc.assert(
      fc.asyncProperty(fc.uint8Array({ maxLength: 2000 }), async (bytes) => {
        const outcome = await ingest([Buffer.from(header), Buffer.from(bytes)]);
        expect(outcome.counts[0]).toBe(outcome.counts[1] + outcome.counts[2]);
      }),
      { numRuns: 300 },
    );
  });
});
