import { describe, expect, it } from 'vitest';
import { describeTemperature } from '@shared/analysis/temperature';
import { UnitCollector } from '@shared/analysis/units';
import { type PartCriteria } from '@shared/contract/parts';
import { partCriteria } from '../../support/lot-fixture';
import { reading } from './readings';

/** A cubic about 25 °C with turning points at 25 -/+ 40 °C: b = 3 c 40^2. */
const c = 1e-4;
const cubic = (t: number, inflection = 25) =>
  c * (t - inflection) ** 3 - 3 * c * 1600 * (t - inflection);
const temperatures = [-40, -20, 0, 25, 45, 65, 85];

function described(
  units: { at: readonly number[]; ppm: (t: number) => number; ohm?: (t: number) => number }[],
  changes: Partial<PartCriteria> = {},
) {
  const collector = new UnitCollector(25);
  units.forEach(({ at, ppm, ohm }, i) =>
    collector.addUnit(
      at.map((temperatureC) =>
        reading(ppm(temperatureC), {
          temperatureC,
          fileLine: i + 2,
          resistanceOhm: ohm?.(temperatureC) ?? null,
        }),
      ),
    ),
  );
  return describeTemperature(
    collector.finish().temperature!,
    { ...partCriteria, ...changes },
    (curve) => `A${curve.place.fileLine}`,
  );
}

describe('units over temperature', () => {
  it('finds turning points and stability of a known cubic', () => {
    const view = described([{ at: temperatures, ppm: (t) => cubic(t) + 2 }]);
    expect(view.turningPointsC[0]).toBeCloseTo(-15, 6);
    expect(view.turningPointsC[1]).toBeCloseTo(65, 6);
    // From the reading at 25 °C: the extremes are 2 c 40^3 at the turning points, or the cubic at the ends.
    const extremes = [-40, -15, 65, 85].map((t) => Math.abs(cubic(t)));
    expect(view.stability.referenceTemperaturePpm).toBeCloseTo(Math.max(...extremes), 6);
    const values = [-40, -15, 65, 85].map((t) => cubic(t) + 2);
    expect(view.stability.nominalPpm).toBeCloseTo(Math.max(...values.map(Math.abs)), 6);
    expect(view.stability.middleOfBandPpm).toBeCloseTo(
      (Math.max(...values) - Math.min(...values)) / 2,
      6,
    );
  });

  it('draws the band of all units, lowest to highest temperature, signs kept', () => {
    const view = described([
      { at: [25, -20, 60], ppm: (t) => t / 10 },
      { at: [60, 25, -20], ppm: (t) => -t / 20 },
    ]);
    expect(view.band).toEqual([
      { temperatureC: -20, lowPpm: -2, medianPpm: -0.5, highPpm: 1 },
      { temperatureC: 25, lowPpm: -1.25, medianPpm: 0.625, highPpm: 2.5 },
      { temperatureC: 60, lowPpm: -3, medianPpm: 1.5, highPpm: 6 },
    ]);
    expect(view.unitsCount).toBe(2);
    expect(view.curves.map(({ serial }) => serial)).toEqual(['A2', 'A3']);
    expect(view.curves[0]!.points).toEqual([
      [-20, -2],
      [25, 2.5],
      [60, 6],
    ]);
  });

  it('counts units beyond the stability by the reference the part names', () => {
    const units = [{ at: [-20, 25, 60], ppm: (t: number) => 9 + (t - 25) / 10 }];
    const beyond = (stabilityReference: PartCriteria['stabilityReference']) =>
      described(units, { stabilityPpm: 5, stabilityReference }).stability.unitsBeyond;
    expect(beyond('reference_temperature')).toBe(0);
    expect(beyond('nominal')).toBe(1);
    expect(beyond('middle_of_band')).toBe(0);
    expect(described(units, { stabilityPpm: 3 }).stability.unitsBeyond).toBe(1);
    expect(described(units, { stabilityPpm: null }).stability).toMatchObject({
      unitsBeyond: 0,
      limitPpm: null,
    });
  });

  it('names the unit with a dip and where it is', () => {
    const at = Array.from({ length: 15 }, (_, i) => -40 + i * 8.5 + (i === 7 ? 5.5 : 0));
    const dipped = described([
      { at, ppm: (t) => cubic(t), ohm: () => 40 },
      { at, ppm: (t) => cubic(t) + (t === at[4] ? 6 : 0), ohm: (t) => (t === at[4] ? 160 : 40) },
    ]);
    expect(dipped.activityDips.map((dip) => [dip.serial, dip.temperatureC])).toEqual([
      ['A3', at[4]],
    ]);
    expect(dipped.activityDips[0]!.residualPpm).toBeGreaterThan(0);
  });
});
