import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { UnitCollector } from '@shared/analysis/units';
import { reading } from './readings';

describe('units gathered from readings', () => {
  it('keeps each unit, its place and its sign, the last row too', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -50, max: 50, noNaN: true }), { minLength: 1, maxLength: 2500 }),
        (offsets) => {
          const collector = new UnitCollector(25);
          offsets.forEach((offsetPpm, i) => collector.addSingle(offsetPpm, 1 + (i % 3), i + 2));
          const units = collector.finish();
          expect([...units.offsetsPpm]).toEqual(offsets);
          expect([...units.fileLines]).toEqual(offsets.map((_, i) => i + 2));
          expect([...units.uploadNumbers]).toEqual(offsets.map((_, i) => 1 + (i % 3)));
          expect(units.readings).toBe(offsets.length);
        },
      ),
      { numRuns: 20 },
    );
  });

  it('takes the mean of a unit read more than once at the reference temperature, once', () => {
    const collector = new UnitCollector(25);
    collector.addUnit([
      reading(4, { fileLine: 7 }),
      reading(7, { fileLine: 8, temperatureC: null }),
    ]);
    const units = collector.finish();
    expect([...units.offsetsPpm]).toEqual([5.5]);
    expect([...units.fileLines]).toEqual([7]);
    expect(units.readings).toBe(2);
  });

  it('loses nothing of the mean of neighbours far from nominal', () => {
    const collector = new UnitCollector(25);
    collector.addUnit([reading(1e6 + 0.25), reading(1e6 + 0.5)]);
    expect(collector.finish().offsetsPpm[0]).toBe(1e6 + 0.375);
  });

  it('judges by the reading at the reference temperature, not by the others', () => {
    const collector = new UnitCollector(25);
    collector.addUnit([
      reading(-9, { temperatureC: -40 }),
      reading(2, { temperatureC: 26.9, fileLine: 3 }),
      reading(11, { temperatureC: 85 }),
    ]);
    const units = collector.finish();
    expect([...units.offsetsPpm]).toEqual([2]);
    expect([...units.fileLines]).toEqual([3]);
    expect(units.temperature?.curves).toEqual([
      {
        place: { uploadNumber: 1, fileLine: 2 },
        temperaturesC: [-40, 26.9, 85],
        offsetsPpm: [-9, 2, 11],
        resistancesOhm: null,
      },
    ]);
    expect([...units.temperature!.byTemperature]).toEqual([
      [-40, [-9]],
      [27, [2]],
      [85, [11]],
    ]);
  });

  it('does not judge a unit that was never read at the reference temperature', () => {
    const collector = new UnitCollector(25);
    collector.addUnit([reading(1, { temperatureC: 27.1 })]);
    collector.addUnit([reading(2, { temperatureC: 27 })]);
    const units = collector.finish();
    expect([...units.offsetsPpm]).toEqual([2]);
    expect(units.unitsWithoutReference).toBe(1);
    expect(units.readings).toBe(2);
  });

  it('counts the units that lack a required temperature, each once', () => {
    const collector = new UnitCollector(25, [-40, 25, 85]);
    collector.addSingle(1, 1, 2);
    collector.addUnit([reading(1), reading(1)]);
    collector.addUnit([-40, 25, 85].map((temperatureC) => reading(1, { temperatureC })));
    collector.addUnit([-40, 25].map((temperatureC) => reading(1, { temperatureC })));
    expect(collector.finish().unitsLackingTemperatures).toBe(3);
    const free = new UnitCollector(25, [25]);
    free.addSingle(1, 1, 2);
    expect(free.finish().unitsLackingTemperatures).toBe(0);
  });

  it('keeps the longest series in the order of time, from sixteen readings on', () => {
    const collector = new UnitCollector(25);
    const series = (count: number, fileLine: number) =>
      Array.from({ length: count }, (_, i) =>
        reading(i, { measuredAtMs: 1000 * (count - i), fileLine }),
      );
    collector.addUnit(series(15, 5));
    expect(collector.finish().series).toBeNull();
    collector.addUnit(series(20, 6));
    collector.addUnit(series(16, 7));
    const { series: kept } = collector.finish();
    expect(kept!.place.fileLine).toBe(6);
    expect(kept!.timesMs[0]).toBe(1000);
    expect(kept!.offsetsPpm[0]).toBe(19);
    expect(kept!.offsetsPpm).toHaveLength(20);
  });

  it('keeps resistances only where all of a unit are known', () => {
    const collector = new UnitCollector(25);
    collector.addUnit([
      reading(1, { temperatureC: 0, resistanceOhm: 40 }),
      reading(1, { temperatureC: 25, resistanceOhm: 42 }),
    ]);
    collector.addUnit([reading(1, { temperatureC: 0, resistanceOhm: 40 }), reading(1)]);
    expect(collector.finish().temperature!.everyCurve.map((curve) => curve.resistancesOhm)).toEqual(
      [[40, 42], null],
    );
  });

  it('refuses a unit without a reading', () => {
    expect(() => new UnitCollector(25).addUnit([])).toThrow(
      expect.objectContaining({ code: 'too_few_values' }),
    );
  });
});
