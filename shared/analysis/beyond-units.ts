import { countBelow, countUpTo } from '../statistics/sorted';

/** Most units listed by name; their number is always exact. */
export const MOST_LISTED = 500;

export interface Bounds {
  lowPpm: number | null;
  highPpm: number | null;
}

export function isBeyond(offsetPpm: number, { lowPpm, highPpm }: Bounds): boolean {
  return (lowPpm !== null && offsetPpm < lowPpm) || (highPpm !== null && offsetPpm > highPpm);
}

/** Units beyond, counted in a sorted lot; a unit on a limit conforms. Allows an allowance of no width. */
export function countBeyondBounds(sortedPpm: Float64Array, { lowPpm, highPpm }: Bounds): number {
  const below = lowPpm === null ? 0 : countBelow(sortedPpm, lowPpm);
  const above = highPpm === null ? 0 : sortedPpm.length - countUpTo(sortedPpm, highPpm);
  return below + above;
}

/** Indices of the units beyond any of the bounds, the farthest out first, at most MOST_LISTED. */
export function farthestBeyond(
  offsetsPpm: Float64Array,
  bounds: readonly Bounds[],
): { indices: number[]; truncated: boolean } {
  const indices: number[] = [];
  for (let i = 0; i < offsetsPpm.length; i += 1) {
    if (bounds.some((b) => isBeyond(offsetsPpm[i]!, b))) indices.push(i);
  }
  const middle = bounds.map((b) => ((b.lowPpm ?? 0) + (b.highPpm ?? 0)) / 2)[0] ?? 0;
  indices.sort(
    (a, b) => Math.abs(offsetsPpm[b]! - middle) - Math.abs(offsetsPpm[a]! - middle) || a - b,
  );
  return { indices: indices.slice(0, MOST_LISTED), truncated: indices.length > MOST_LISTED };
}
