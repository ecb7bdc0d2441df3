import { type BandStripInput } from '@shared/band-strip/types';

export type Place = 'within' | 'beyond' | 'straddles';

export interface HistogramBin {
  fromPpm: number;
  toPpm: number;
  units: number;
  place: Place;
  /** Units expected in this bin if the lot were normal with its own mean and spread. */
  expected: number | null;
}

/** Units a normal lot would show at `ppm` in a bin `widthPpm` wide: n w phi(z) / s. */
export function normalUnits(input: BandStripInput, ppm: number, widthPpm: number): number | null {
  const { meanPpm, sdPpm, unitsCount } = input;
  if (meanPpm === null || sdPpm === null || !(sdPpm > 0)) return null;
  const z = (ppm - meanPpm) / sdPpm;
  return (unitsCount * widthPpm * Math.exp((-z * z) / 2)) / (sdPpm * Math.sqrt(2 * Math.PI));
}

export function histogramBins(input: BandStripInput): HistogramBin[] {
  const { edgesPpm, counts } = input.histogram;
  const low = input.lowLimitPpm ?? -Infinity;
  const high = input.highLimitPpm ?? Infinity;
  return counts.map((units, index) => {
    const fromPpm = edgesPpm[index]!;
    const toPpm = edgesPpm[index + 1]!;
    const isBeyond = toPpm <= low || fromPpm >= high;
    const isWithin = fromPpm >= low && toPpm <= high;
    return {
      fromPpm,
      toPpm,
      units,
      place: isBeyond ? 'beyond' : isWithin ? 'within' : 'straddles',
      expected: normalUnits(input, (fromPpm + toPpm) / 2, toPpm - fromPpm),
    };
  });
}

/** Limits, allowance and every unit fit on the axis, with a margin. */
export function histogramRange(input: BandStripInput): { lowPpm: number; highPpm: number } {
  const { edgesPpm } = input.histogram;
  const ends = [
    input.lowLimitPpm,
    input.highLimitPpm,
    input.allowanceLowPpm,
    input.allowanceHighPpm,
    edgesPpm[0] ?? null,
    edgesPpm.at(-1) ?? null,
  ].filter((value) => value !== null);
  const low = Math.min(0, ...ends);
  const high = Math.max(0, ...ends);
  const margin = 0.05 * (high - low || 2);
  return { lowPpm: low - margin, highPpm: high + margin };
}

/** Unequal bins are drawn by density, scaled to the typical bin, so that areas compare. */
export function unitsPerBin(bin: HistogramBin, typicalWidthPpm: number): number {
  return (bin.units * typicalWidthPpm) / (bin.toPpm - bin.fromPpm);
}

export function medianWidthPpm(bins: readonly HistogramBin[]): number {
  const widths = bins.map((bin) => bin.toPpm - bin.fromPpm).sort((a, b) => a - b);
  return widths[Math.floor(widths.length / 2)] ?? 1;
}

/** The normal curve of the lot's mean and spread over five spreads either side, as [ppm, units per typical bin]. */
export function curvePoints(input: BandStripInput, widthPpm: number): [number, number][] {
  const { meanPpm, sdPpm } = input;
  if (meanPpm === null || sdPpm === null || !(sdPpm > 0)) return [];
  return Array.from({ length: 161 }, (_, step): [number, number] => {
    const ppm = meanPpm + (step / 16 - 5) * sdPpm;
    return [ppm, normalUnits(input, ppm, widthPpm) ?? 0];
  });
}
