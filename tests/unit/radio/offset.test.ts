import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  fromHzText,
  makeOffsetPpm,
  makeReadingToPpm,
  offsetPpm,
  offsetPpmText,
  RadioError,
  toHzText,
} from '@shared/radio';

const nominalText = fc.constantFrom('10000000', '32768', '26000000.5', '16368000.000000001', '0.5');

/** A decimal text of hertz near the nominal, with up to fifteen decimals. */
const reading = fc
  .tuple(fc.integer({ min: 9_999_000, max: 10_001_000 }), fc.stringMatching(/^\d{0,15}$/))
  .map(([whole, decimals]) => (decimals ? `${whole}.${decimals}` : String(whole)));

describe('offset in ppm of a text in hertz', () => {
  it('keeps the last of fifteen decimals at 10 MHz', () => {
    expect(offsetPpm('10000000.000000000000001', '10000000')).toBe(1e-16);
    expect(offsetPpm('9999999.999999999999999', '10000000')).toBe(-1e-16);
    expect(makeOffsetPpm('10000000').ofText('9999999.999999999999999')).toBe(-1e-16);
  });

  it('is zero only at nominal, however nominal is written', () => {
    expect(offsetPpm('1.0e7', '10000000.00')).toBe(0);
    expect(makeOffsetPpm('10000000.00').ofText('1.0e7')).toBe(0);
  });

  it('quick text and byte readers agree with exact arithmetic', () => {
    fc.assert(
      fc.property(
        reading,
        fc.constantFrom('10000000', '9999999.5', '10000000.000000001'),
        (text, nominal) => {
          const exact = offsetPpm(text, nominal);
          const reader = makeOffsetPpm(nominal);
          const bytes = new TextEncoder().encode(`;${text};`);
          const allowed = 4 * Number.EPSILON * Math.abs(exact);
          expect(Math.abs(reader.ofText(text) - exact)).toBeLessThanOrEqual(allowed);
          expect(reader.ofBytes(bytes, 1, bytes.length - 1)).toBe(reader.ofText(text));
        },
      ),
      { numRuns: 500 },
    );
  });

  it('doubles give what the double holds, also against a nominal with decimals', () => {
    fc.assert(
      fc.property(nominalText, fc.integer({ min: -(2 ** 40), max: 2 ** 40 }), (nominal, step) => {
        const frequencyHz = Number(nominal) * (1 + step * 2 ** -50);
        const whatItHolds = toHzText(frequencyHz.toPrecision(17), 'Hz', nominal);
        const exact = offsetPpm(whatItHolds, nominal);
        const ppm = makeOffsetPpm(nominal).ofNumber(frequencyHz);
        expect(Math.abs(ppm - exact)).toBeLessThanOrEqual(1e-10 + 1e-12 * Math.abs(exact));
      }),
    );
  });

  it('shifts linearly: adding k nominal millionths adds k ppm', () => {
    fc.assert(
      fc.property(reading, fc.integer({ min: -1000, max: 1000 }), (text, k) => {
        const [whole = '', decimals = ''] = text.split('.');
        const shifted = `${Number(whole) + 10 * k}${decimals ? `.${decimals}` : ''}`;
        const difference = offsetPpm(shifted, '10000000') - offsetPpm(text, '10000000');
        expect(difference).toBeCloseTo(k, 9);
      }),
    );
  });

  it('writes the same digits as a rounded numeric of the database', () => {
    expect(offsetPpmText('10000000.126856699585915', '10000000', 12)).toBe('0.012685669959');
    expect(offsetPpmText('9999999.95', '10000000', 2)).toBe('-0.01');
    expect(offsetPpmText('9999999.999', '10000000', 2)).toBe('0.00');
    expect(offsetPpmText('10000012', '10000000', 0)).toBe('1');
    expect(offsetPpmText('10000015', '10000000', 0)).toBe('2');
  });

  it.each([
    ['', 'not_a_decimal'],
    ['abc', 'not_a_decimal'],
    ['1,5', 'not_a_decimal'],
    [' 10', 'not_a_decimal'],
    ['1e99', 'not_a_decimal'],
    ['1'.repeat(200), 'not_a_decimal'],
    ['.', 'not_a_decimal'],
    ['-10000000', 'not_positive'],
    ['0.000', 'not_positive'],
    ['NaN', 'not_a_decimal'],
    ['1000000\u0130', 'not_a_decimal'],
    ['\uff11\uff10', 'not_a_decimal'],
  ])('refuses "%s" in text and bytes', (text, code) => {
    const reader = makeOffsetPpm('10000000');
    const expectation = expect.objectContaining({ code, argument: 'frequencyHz' });
    expect(() => offsetPpm(text, '10000000')).toThrow(expectation);
    expect(() => reader.ofText(text)).toThrow(expectation);
    expect(() => reader.ofBytes(new TextEncoder().encode(text))).toThrow(expectation);
  });

  it('refuses a nominal of zero and numbers that are no frequency', () => {
    expect(() => makeOffsetPpm('0')).toThrow(RadioError);
    expect(() => makeOffsetPpm('10000000').ofNumber(Number.NaN)).toThrow(RadioError);
    expect(() => makeOffsetPpm('10000000').ofNumber(-1)).toThrow(RadioError);
  });
});

describe('units of a reading', () => {
  it('moves the point without losing a digit', () => {
    expect(toHzText('10.000000126856699585915', 'MHz', '1')).toBe('10000000.126856699585915');
    expect(toHzText('32.768', 'kHz', '1')).toBe('32768');
    expect(fromHzText('10000000.126856699585915', 'MHz')).toBe('10.000000126856699585915');
    expect(toHzText('-1.5', 'ppm', '10000000')).toBe('9999985');
    expect(toHzText('12.6856699585915', 'ppb', '10000000')).toBe('10000000.126856699585915');
  });

  it('to hertz and back is the same number', () => {
    fc.assert(
      fc.property(reading, fc.constantFrom('kHz', 'MHz', 'GHz', 'Hz'), (text, unit) => {
        expect(toHzText(fromHzText(text, unit as 'kHz'), unit as 'kHz', '1')).toBe(
          toHzText(text, 'Hz', '1'),
        );
      }),
    );
  });

  it('a reading in ppm is the offset that was written', () => {
    fc.assert(
      fc.property(fc.integer({ min: -99_999, max: 99_999 }), (thousandths) => {
        const ppm = thousandths / 1000;
        expect(offsetPpm(toHzText(String(ppm), 'ppm', '32768'), '32768')).toBe(ppm);
      }),
    );
  });

  it('a reading gives the same offset in whatever unit it was written', () => {
    expect(makeReadingToPpm('Hz', '10000000')('10000000.126856699585915')).toBe(0.0126856699585915);
    expect(makeReadingToPpm('MHz', '10000000')('10.000000126856699585915')).toBe(
      0.0126856699585915,
    );
    expect(makeReadingToPpm('kHz', '32768')('32.7681')).toBe(offsetPpm('32768.1', '32768'));
    expect(makeReadingToPpm('ppm', '32768')('-1.25')).toBe(-1.25);
    expect(makeReadingToPpm('ppb', '32768')('12.5')).toBe(0.0125);
    for (const unit of ['Hz', 'GHz', 'ppm', 'ppb'] as const) {
      expect(() => makeReadingToPpm(unit, '32768')('1,25')).toThrow(RadioError);
      expect(() => makeReadingToPpm(unit, '0')).toThrow(RadioError);
    }
  });
});
