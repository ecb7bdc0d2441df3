import { afterEach, describe, expect, it } from 'vitest';
import { count } from '@shared/format/counts';
import { reading } from '@shared/format/hertz';
import { parseNumber } from '@shared/format/parse-number';
import { ppm } from '@shared/format/ppm';
import { neutralSigns, readSignsFrom, signsOf } from '@shared/format/signs';

const partsIn = (locale: string) => new Intl.NumberFormat(locale).formatToParts(12345.6);
afterEach(() => readSignsFrom(() => neutralSigns));

describe('the signs of a locale', () => {
  it('write offsets, counts and readings as its people do', () => {
    readSignsFrom(() => signsOf(partsIn('de')));
    expect(ppm(-1.88)).toBe('−1,88\u00a0ppm');
    expect(count(3500)).toBe('3\u00a0500');
    expect(reading('10000012.20')).toBe('10\u00a0000\u00a0012,20\u00a0Hz');
    readSignsFrom(() => signsOf(partsIn('en')));
    expect(count(3500)).toBe('3,500');
  });
  it('never use a point between thousands beside a decimal comma', () => {
    for (const locale of ['de', 'nl', 'es', 'it', 'pt-BR', 'da', 'id', 'tr', 'fr', 'sv'])
      expect(signsOf(partsIn(locale)), locale).toEqual({ decimal: ',', group: '\u00a0' });
    expect(signsOf(partsIn('de-CH'))).toEqual({ decimal: '.', group: '’' });
  });
  it('keep what is written readable: what was shown can be typed back', () => {
    for (const locale of ['de', 'fr', 'en', 'de-CH']) {
      const signs = signsOf(partsIn(locale));
      readSignsFrom(() => signs);
      for (const value of ['1234.5', '1.234', '-0.125', '10000012.25']) {
        const shown = reading(value).replace('\u00a0Hz', '');
        expect(
          parseNumber(shown, { usualSign: signs.decimal }),
          `${locale} ${shown}`,
        ).toMatchObject({
          ok: true,
          value: Number(value),
        });
      }
    }
  });
});

describe('a number typed by a person with a decimal comma', () => {
  it('may have either decimal sign', () => {
    expect(parseNumber('1,5', { usualSign: ',' })).toMatchObject({ value: 1.5 });
    expect(parseNumber('1.5', { usualSign: ',' })).toMatchObject({ value: 1.5 });
    expect(parseNumber('1,5', { usualSign: '.' })).toMatchObject({ value: 1.5 });
  });
  it('is read by habit where it could be two numbers, and refused where there is no habit', () => {
    expect(parseNumber('1,234', { usualSign: ',' })).toMatchObject({ value: 1.234 });
    expect(parseNumber('1,234', { usualSign: '.' }).ok).toBe(false);
    expect(parseNumber('1,234').ok).toBe(false);
  });
});
