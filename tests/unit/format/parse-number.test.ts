import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { parseNumber } from '@shared/format/parse-number';

const value = (text: string, decimalSign?: '.' | ',') => {
  const parsed = parseNumber(text, decimalSign === undefined ? {} : { decimalSign });
  return parsed.ok ? parsed.value : 'refused';
};

describe('a number typed by a person', () => {
  it.each([
    ['10', 10],
    ['+10.5', 10.5],
    ['-0,5', -0.5],
    ['\u221212.9', -12.9],
    ['1.234,5', 1234.5],
    ['1,234.5', 1234.5],
    ['1.234.567', 1_234_567],
    ['1,234,567', 1_234_567],
    ['10 000 000.126', 10_000_000.126],
    ['10\u00a0000\u00a0000,126', 10_000_000.126],
    ["1'234.5", 1234.5],
    ['1.234', 1.234],
    ['0,125', 0.125],
    ['.5', 0.5],
    [',5', 0.5],
    ['5.', 5],
    ['1e-3', 0.001],
    ['2,5E6', 2.5e6],
    ['0032768', 32_768],
  ])('%s is %d', (text, expected) => expect(value(text)).toBe(expected));

  it.each([
    '',
    '  ',
    '1.234,5,6',
    '1,2,3',
    '12,34.5',
    '1.2.3',
    '1,234',
    '12 34',
    '1 2.5',
    '--5',
    'ten',
    '5 ppm',
    '1.5.',
    '.',
    ',',
    '1e',
    'NaN',
    'Infinity',
    '1e999',
    "1'2 345",
  ])('“%s” is refused', (text) => expect(value(text)).toBe('refused'));

  it('reads an unclear number when the decimal sign is known', () => {
    expect(value('1,234', ',')).toBe(1.234);
    expect(value('1,234', '.')).toBe(1234);
    expect(value('1.234', ',')).toBe(1234);
    expect(value('12.34', ',')).toBe('refused');
  });

  it('says what an unclear number could mean', () => {
    const parsed = parseNumber('1,234');
    expect(parsed.ok ? '' : parsed.message).toContain('1234 or 1.234');
  });

  it('keeps every digit in the plain form', () => {
    const parsed = parseNumber('10 000 000,126856699585915');
    expect(parsed.ok && parsed.canonical).toBe('10000000.126856699585915');
  });

  it('reads back whatever is written with one point', () => {
    fc.assert(
      fc.property(
        fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e15, max: 1e15 }),
        (x) => {
          const parsed = parseNumber(String(x));
          expect(parsed.ok && Object.is(parsed.value + 0, x + 0)).toBe(true);
        },
      ),
    );
  });

  it('never throws on anything typed', () => {
    fc.assert(fc.property(fc.string(), (text) => void parseNumber(text)));
  });
});
