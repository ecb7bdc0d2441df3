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

/**
 * Indices of the units beyond any of the bounds, the farthest beyond the tightest of them first, at most MOST_LISTED; of
 * equally far units the one that came first. One pass over the lot, and never more held than is listed.
 * @param offsetsPpm in order of arrival @param sortedPpm the same, ascending
 */
export function farthestBeyond(
  offsetsPpm: Float64Array,
  sortedPpm: Float64Array,
  bounds: readonly Bounds[],
): { indices: number[]; truncated: boolean } {
  const low = Math.max(...bounds.map(({ lowPpm }) => lowPpm ?? -Infinity));
  const high = Math.min(...bounds.map(({ highPpm }) => highPpm ?? Infinity));
  /** How far beyond the tightest bounds; zero or below for a unit within all of them. */
  const excess = (offsetPpm: number) => Math.max(low - offsetPpm, offsetPpm - high);

  // The farthest units stand at the ends of the sorted lot: that tells the least excess that is still listed.
  const listed: number[] = [];
  let from = 0;
  let to = sortedPpm.length - 1;
  let next = 0;
  while (from <= to) {
    const [atLow, atHigh] = [excess(sortedPpm[from]!), excess(sortedPpm[to]!)];
    next = Math.max(atLow, atHigh);
    if (!(next > 0) || listed.length === MOST_LISTED) break;
    listed.push(next);
    if (atLow >= atHigh) from += 1;
    else to -= 1;
  }
  const truncated = from <= to && next > 0;
  const least = listed.at(-1);
  if (least === undefined) return { indices: [], truncated };

  let equalLeft = listed.filter((value) => value === least).length;
  const indices: number[] = [];
  for (let i = 0; i < offsetsPpm.length; i += 1) {
    const offsetPpm = offsetsPpm[i]!;
    const beyond = Math.max(low - offsetPpm, offsetPpm - high);
    if (beyond < least) continue;
    if (beyond === least) {
      if (equalLeft === 0) continue;
      equalLeft -= 1;
    }
    indices.push(i);
  }
  indices.sort((a, b) => excess(offsetsPpm[b]!) - excess(offsetsPpm[a]!) || a - b);
  return { indices, truncated };
}
