import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { count, countOf, listOf, spelledCount } from '@shared/format/counts';
import { date, dateTime, timeOfDay } from '@shared/format/dates';
import { duration, roughDuration } from '@shared/format/durations';
import { hertz, reading, symbolRate } from '@shared/format/hertz';
import { formatNumber } from '@shared/format/number';
import { percent, percentAsSet, percentPair, percentParts } from '@shared/format/percent';
import { beyondLimits, limitsPpm, ppm, ppmParts } from '@shared/format/ppm';
import { expandedUncertainty, withUncertainty } from '@shared/format/uncertainty';

/** Checks read easier with ordinary spaces; one test looks at the real one. */
const plain = (text: string) => text.replaceAll('\u00a0', ' ');

describe('numbers', () => {
  it('uses the true minus, groups thousands and keeps whole digits', () => {
    expect(formatNumber(-12345.678)).toBe('\u221212,346');
    expect(formatNumber(-0.0001, { decimals: 2 })).toBe('0.00');
    expect(formatNumber(1.5, { sign: 'always' })).toBe('+1.5');
    expect(formatNumber(0, { sign: 'always' })).toBe('0');
    expect(formatNumber(9.996, { significant: 3 })).toBe('10');
    expect(formatNumber(Number.NaN)).toBe('–');
    expect(formatNumber(null)).toBe('–');
  });
  it('never writes an exponent and always reads back within its digits', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e12, max: 1e12, noNaN: true }), (value) => {
        const text = formatNumber(value, { significant: 4 });
        expect(text).toMatch(/^[\u2212]?[\d,]+(\.\d+)?$/);
        const back = Number(text.replaceAll(',', '').replace('\u2212', '-'));
        expect(Math.abs(back - value)).toBeLessThanOrEqual(
          Math.max(Math.abs(value) * 5.1e-4, 1e-15),
        );
      }),
    );
  });
});

describe('ppm and limits', () => {
  it('keeps number and unit together and apart', () => {
    expect(ppm(1.88, { sign: 'always' })).toBe('+1.88\u00a0ppm');
    expect(ppmParts(-12.9)).toEqual({ number: '\u221212.9', unit: 'ppm' });
    expect(plain(ppm(1, { decimals: 1 }))).toBe('1.0 ppm');
  });
  it('writes limits as the trade does', () => {
    expect(plain(limitsPpm({ lowPpm: -10, highPpm: 10 }))).toBe('±10 ppm');
    expect(plain(limitsPpm({ lowPpm: -5, highPpm: 10 }))).toBe('\u22125 to +10 ppm');
    expect(plain(limitsPpm({ lowPpm: null, highPpm: 10 }))).toBe('up to +10 ppm');
    expect(plain(beyondLimits({ lowPpm: -10, highPpm: 10 }))).toBe('beyond ±10 ppm');
    expect(plain(beyondLimits({ lowPpm: -10, highPpm: null }))).toBe('below \u221210 ppm');
    expect(plain(beyondLimits({ lowPpm: -5, highPpm: 10 }))).toBe('outside \u22125 to +10 ppm');
  });
});

describe('hertz', () => {
  it('chooses the unit', () => {
    expect(plain(hertz(10_000_000))).toBe('10 MHz');
    expect(plain(hertz(2.4e9))).toBe('2.4 GHz');
    expect(plain(hertz(32_768))).toBe('32.768 kHz');
    expect(plain(hertz(999_999.9))).toBe('1 MHz');
    expect(plain(hertz(0))).toBe('0 Hz');
    expect(plain(hertz(0.0024))).toBe('2.4 mHz');
    expect(plain(hertz(-150_000))).toBe('\u2212150 kHz');
    expect(plain(symbolRate(200_000))).toBe('200 ksymbol/s');
  });
  it('leaves a reading digit for digit', () => {
    expect(plain(reading('10000000.126856699585915'))).toBe('10,000,000.126856699585915 Hz');
    expect(plain(reading('32768.00'))).toBe('32,768.00 Hz');
  });
});

describe('percent', () => {
  it('keeps small shares and near-whole shares honest', () => {
    expect(plain(percent(0.015))).toBe('1.5 %');
    expect(plain(percent(0.0383))).toBe('3.8 %');
    expect(plain(percent(0.0002))).toBe('0.02 %');
    expect(plain(percent(0.9998))).toBe('99.98 %');
    expect(plain(percent(0))).toBe('0 %');
    expect(plain(percent(1))).toBe('100 %');
    expect(plain(percent(1e-9))).toBe('<0.0001 %');
    expect(plain(percent(1 - 1e-9))).toBe('>99.9999 %');
    expect(plain(percent(0.00003, { decimals: 2 }))).toBe('0.003 %');
    expect(plain(percentAsSet(0.25))).toBe('0.25 %');
    expect(plain(percentAsSet(0.01))).toBe('0.01 %');
  });
  it('shows two unequal shares as unequal', () => {
    expect(percentPair(0.00304, 0.003).map(plain)).toEqual(['0.304 %', '0.3 %']);
    fc.assert(
      fc.property(fc.double({ min: 1e-5, max: 1 - 1e-5, noNaN: true }), (share) => {
        expect(percentParts(share).number).not.toBe('0');
        expect(percentParts(share).number).not.toBe('100');
      }),
    );
  });
});

describe('counts', () => {
  it('agrees in number', () => {
    expect(plain(countOf(1, 'unit'))).toBe('1 unit');
    expect(plain(countOf(3000, 'unit'))).toBe('3,000 units');
    expect(spelledCount(3, 'unit')).toBe('three units');
    expect(plain(spelledCount(40, 'unit'))).toBe('40 units');
    expect(count(1_000_000)).toBe('1,000,000');
    expect(listOf(['a', 'b', 'c'])).toBe('a, b and c');
  });
});

describe('uncertainty', () => {
  it('rounds value and U to one place', () => {
    expect(
      plain(withUncertainty({ value: 1.8764, expanded: 0.1234, coverageFactor: 2 }, 'ppm')),
    ).toBe('+1.88 ± 0.12 ppm (k = 2)');
    expect(plain(expandedUncertainty(1, 'ppm'))).toBe('1.0 ppm');
    expect(plain(expandedUncertainty(0.0995, 'ppm'))).toBe('0.10 ppm');
  });
});

describe('time', () => {
  it('writes durations', () => {
    expect(plain(duration(0.8))).toBe('0.8 s');
    expect(plain(duration(0.012))).toBe('12 ms');
    expect(plain(duration(200))).toBe('3 min 20 s');
    expect(plain(duration(7500))).toBe('2 h 5 min');
    expect(plain(duration(3 * 86_400))).toBe('3 days');
    expect(plain(duration(3599.7))).toBe('1 h');
    expect(plain(roughDuration(-400 * 86_400))).toBe('13 months');
  });
  it('writes days and instants with their zone', () => {
    expect(plain(date('2026-03-02'))).toBe('2 Mar 2026');
    expect(plain(date('2026-03-02', 'America/Los_Angeles'))).toBe('2 Mar 2026');
    expect(plain(dateTime('2026-09-02T22:30:00Z'))).toBe('2 Sep 2026, 22:30 UTC');
    expect(plain(dateTime('2026-09-02T22:30:05Z', 'Asia/Tokyo', { seconds: true }))).toBe(
      '3 Sep 2026, 07:30:05 GMT+9',
    );
    expect(plain(dateTime('2026-09-02T22:30:00Z', 'Europe/Berlin'))).toMatch(
      /^3 Sep 2026, 00:30 (CEST|GMT\+2)$/,
    );
    expect(timeOfDay('2026-09-02T22:30:00Z')).toBe('22:30 UTC');
    expect(date(null)).toBe('–');
    expect(dateTime('rubbish')).toBe('–');
  });
});
