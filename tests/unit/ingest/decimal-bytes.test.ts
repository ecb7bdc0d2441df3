import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { writeNumeric } from '../../../server/ingest/decimal-bytes';

/** Reads the wire form of numeric as the PostgreSQL protocol describes it: groups of four digits, weight, sign, scale. */
function textOf(bytes: Buffer): string {
  const groups = bytes.readInt16BE(0);
  const weight = bytes.readInt16BE(2);
  const sign = bytes.readInt16BE(4) === 0x4000 ? '-' : '';
  const scale = bytes.readInt16BE(6);
  const digit = (index: number) =>
    index >= 0 && index < groups
      ? String(bytes.readInt16BE(8 + 2 * index)).padStart(4, '0')
      : '0000';
  let whole = '';
  for (let i = 0; i <= weight; i += 1) whole += digit(i);
  let fraction = '';
  for (let i = weight + 1; fraction.length < scale; i += 1) fraction += digit(i);
  const text = `${sign}${whole.replace(/^0+(?=\d)/, '') || '0'}`;
  return scale ? `${text}.${fraction.slice(0, scale)}` : text;
}

function written(text: string): string | null {
  const out = Buffer.alloc(64);
  const bytes = Buffer.from(text, 'latin1');
  const end = writeNumeric(out, 0, bytes, 0, bytes.length);
  return end === -1 ? null : textOf(out.subarray(0, end));
}

vi.setConfig({ testTimeout: 60_000 });

describe('numeric in binary', () => {
  it('keeps every written digit', () => {
    const digits = (min: number, max: number) =>
      fc.stringMatching(new RegExp(`^[0-9]{${min},${max}}$`));
    fc.assert(
      fc.property(fc.boolean(), digits(1, 20), digits(0, 30), (negative, whole, fraction) => {
        const text = `${whole}${fraction ? `.${fraction}` : ''}`;
        const plain = text.replace(/^0+(?=\d)/, '');
        const zero = /^[0.]*$/.test(text);
        expect(written(`${negative ? '-' : ''}${text}`)).toBe(
          `${negative && !zero ? '-' : ''}${plain}`,
        );
      }),
      { numRuns: 2000 },
    );
  });

  it.each(['', '.', '-', '1.2.3', '1e5', ' 1', '1 ', 'x', '١', '1,5'])('refuses %j', (text) => {
    expect(written(text)).toBeNull();
  });
});
