import { toHzText } from '../shared/radio/units';
import { randomSource, type RandomSource } from './random';

export interface ReadingsRecipe {
  seed: number;
  nominalHz: string;
  units: number;
  meanPpm: number;
  sdPpm: number;
  /** Offsets of units that stand apart. */
  strays?: number[];
  serialPrefix: string;
  startedAt: string;
  /** Decimals that the counter shows. */
  decimals?: number;
}

const header = 'serial,temperature_c,frequency_hz,measured_at';

/** Decimal text of nominal x (1 + offset), rounded as a counter shows it. */
function shown(nominalHz: string, offsetPpm: number, decimals: number): string {
  const [whole = '0', fraction = ''] = toHzText(offsetPpm.toFixed(9), 'ppm', nominalHz).split('.');
  const digits = (fraction + '0'.repeat(decimals)).slice(0, decimals);
  return decimals > 0 ? `${whole}.${digits}` : whole;
}

/** One reading a unit at the reference temperature, as the bench writes it. */
export function sampleCsv(recipe: ReadingsRecipe): string {
  const random = randomSource(recipe.seed);
  const offsets = Array.from({ length: recipe.units }, () =>
    random.normal(recipe.meanPpm, recipe.sdPpm),
  );
  (recipe.strays ?? []).forEach(
    (stray, i) =>
      (offsets[Math.floor(((i + 1) * recipe.units) / ((recipe.strays?.length ?? 0) + 2))] = stray),
  );
  const start = Date.parse(recipe.startedAt);
  const rows = offsets.map((offset, i) => {
    const serial = `${recipe.serialPrefix}${String(i + 1).padStart(4, '0')}`;
    const temperature = (25 + random.normal(0, 0.15)).toFixed(2);
    return `${serial},${temperature},${shown(recipe.nominalHz, offset, recipe.decimals ?? 3)},${new Date(start + i * 4000).toISOString()}`;
  });
  return `${header}\n${rows.join('\n')}\n`;
}

/** AT-cut crystals at chamber temperatures; two units carry an activity dip. */
export function chamberCsv({
  seed,
  nominalHz,
  units,
  serialPrefix,
  startedAt,
}: Pick<ReadingsRecipe, 'seed' | 'nominalHz' | 'units' | 'serialPrefix' | 'startedAt'>): string {
  const random = randomSource(seed);
  const temperatures = [-40, -25, -10, 5, 15, 25, 35, 45, 60, 75, 85];
  const start = Date.parse(startedAt);
  const rows = Array.from({ length: units }, (_, unit) =>
    chamberUnit(random, unit, temperatures),
  ).flatMap(({ offsets }, unit) =>
    temperatures.map((t, i) => {
      const serial = `${serialPrefix}${String(unit + 1).padStart(4, '0')}`;
      return `${serial},${t.toFixed(1)},${shown(nominalHz, offsets[i]!, 3)},${new Date(start + (i * units + unit) * 4000).toISOString()}`;
    }),
  );
  return `${header}\n${rows.join('\n')}\n`;
}

function chamberUnit(random: RandomSource, unit: number, temperatures: number[]) {
  const atReference = random.normal(0.8, 1.9);
  const slope = random.normal(-0.18, 0.02);
  const curvature = random.normal(0.0004, 0.0002);
  const dips = unit === 4 || unit === 11;
  const offsets = temperatures.map((t) => {
    const x = t - 25;
    return (
      atReference +
      slope * x +
      curvature * x * x +
      1.05e-4 * x ** 3 +
      random.normal(0, 0.05) +
      (dips && t === 60 ? -3.4 : 0)
    );
  });
  return { offsets };
}

/** An oven oscillator over ninety days, one reading a day: logarithmic ageing. */
export function ageingCsv({
  seed,
  nominalHz,
  serialPrefix,
  startedAt,
}: Pick<ReadingsRecipe, 'seed' | 'nominalHz' | 'serialPrefix' | 'startedAt'>): string {
  const random = randomSource(seed);
  const start = Date.parse(startedAt);
  const rows = Array.from({ length: 90 }, (_, day) => {
    const offset = 0.012 + 0.014 * Math.log(0.12 * day + 1) + random.normal(0, 0.00035);
    return `${serialPrefix}0001,,${shown(nominalHz, offset, 6)},${new Date(start + day * 86_400_000).toISOString()}`;
  });
  return `${header}\n${rows.join('\n')}\n`;
}
