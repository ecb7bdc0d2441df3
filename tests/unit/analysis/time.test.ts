import { describe, expect, it } from 'vitest';
import { describeTime } from '@shared/analysis/time';
import { UnitCollector } from '@shared/analysis/units';
import { makeOffsetPpm } from '@shared/radio';
import { casesOf, readTable } from '../../reference/radio/cases';
import { reading } from './readings';

const day = 86_400_000;
const place = { uploadNumber: 1, fileLine: 2 };
const every = (stepMs: number, offsetsPpm: number[]) => ({
  place,
  timesMs: offsetsPpm.map((_, i) => 1_700_000_000_000 + i * stepMs),
  offsetsPpm,
});

describe('one unit over time', () => {
  // Deviations stored beside the record, see tests/records/ORIGIN.md and radio-formula-cases.json.
  it.each(casesOf('allan-real'))(
    'finds the Allan deviation of a real oven oscillator through readings: m = $inputs.averaging_factor',
    ({ inputs, expected, tolerance }) => {
      const reader = makeOffsetPpm(String(inputs.nominal_hz));
      const rows = readTable(inputs.file);
      const collector = new UnitCollector(25);
      collector.addUnit(
        rows.map((row, i) =>
          reading(reader.ofText(row.frequency_hz!), {
            measuredAtMs: Number(row.elapsed_s ?? i) * 1000,
            fileLine: i + 2,
          }),
        ),
      );
      const { allanDeviation, readingsCount, spanS } = describeTime(
        collector.finish().series!,
        'OCXO',
      );
      expect(readingsCount).toBe(rows.length);
      expect(spanS).toBe(rows.length - 1);
      const point = allanDeviation.find(({ tauS }) => tauS === inputs.averaging_factor);
      const allowed = (tolerance as { value: number }).value;
      expect(Math.abs(point!.overlapping / expected.oadev - 1)).toBeLessThan(allowed);
      expect(Math.abs(point!.plain! / expected.adev - 1)).toBeLessThan(allowed);
    },
  );

  it('gives no Allan deviation for uneven spacing', () => {
    const series = every(
      1000,
      Array.from({ length: 30 }, (_, i) => Math.sin(i)),
    );
    expect(describeTime(series, 'A').allanDeviation.length).toBeGreaterThan(0);
    const gap = { ...series, timesMs: series.timesMs.map((t, i) => (i > 20 ? t + 5000 : t)) };
    expect(describeTime(gap, 'A').allanDeviation).toEqual([]);
    const still = { ...series, timesMs: series.timesMs.map(() => 1000) };
    expect(describeTime(still, 'A')).toMatchObject({ spanS: 0, allanDeviation: [] });
  });

  it('projects ageing with its sign and its half width', () => {
    const rising = Array.from(
      { length: 60 },
      (_, i) => 2 + 0.8 * Math.log1p(0.3 * (i + 0.5)) + 0.002 * Math.sin(9 * i),
    );
    const up = describeTime(every(day, rising), 'A').ageing!;
    const down = describeTime(
      every(
        day,
        rising.map((ppm) => 4 - ppm),
      ),
      'A',
    ).ageing!;
    expect(up.model).toBe('logarithmic');
    // 0.8 ln((1 + 0.3 t)/(1 + 0.3 59.5)), t a year after the start or after the last reading.
    const change = 0.8 * Math.log((1 + 0.3 * 365.25) / (1 + 0.3 * 59.5));
    expect(up.oneYearPpm! / change).toBeGreaterThan(0.85);
    expect(up.oneYearPpm! / change).toBeLessThan(1.15);
    expect(down.oneYearPpm!).toBeCloseTo(-up.oneYearPpm!, 6);
    expect(up.tenYearsPpm!).toBeGreaterThan(up.oneYearPpm!);
    expect(up.oneYearHalfWidthPpm!).toBeGreaterThan(0);
    expect(up.note).not.toBe('');
  });

  it('says "not determined" for a short span, two days only, a still unit or a straight course', () => {
    const model = (offsets: number[], stepMs: number) =>
      describeTime(every(stepMs, offsets), 'A').ageing;
    const steps = Array.from({ length: 20 }, (_, i) => i);
    expect(model(steps, day / 4)).toMatchObject({ model: 'not_determined', oneYearPpm: null });
    const twoDays = {
      place,
      timesMs: steps.map((i) => (i < 19 ? i : 8 * day)),
      offsetsPpm: steps,
    };
    expect(describeTime(twoDays, 'A').ageing.model).toBe('not_determined');
    expect(
      model(
        steps.map(() => 3),
        day,
      )!.model,
    ).toBe('not_determined');
    expect(
      model(
        steps.map((i) => 0.01 * i),
        day,
      )!.model,
    ).toBe('not_determined');
  });

  it('thins a long series without losing an excursion or the last reading', () => {
    const offsets = Array.from({ length: 20_000 }, (_, i) => Math.sin(i / 50));
    offsets[12_345] = 40;
    offsets[777] = -30;
    offsets[19_999] = 5;
    const { series } = describeTime(every(1000, offsets), 'A');
    expect(series.length).toBeLessThanOrEqual(1500);
    expect(series).toContainEqual([12_345, 40]);
    expect(series).toContainEqual([777, -30]);
    expect(series.at(-1)).toEqual([19_999, 5]);
    const times = series.map(([t]) => t);
    expect(times).toEqual([...times].sort((a, b) => a - b));
  });
});
