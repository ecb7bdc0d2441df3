import { ON_LIMIT_PPM } from '../decision/rule';
import { type Bounds } from './beyond-units';

/**
 * The offsets with every value that rounding alone keeps off a limit put onto it, so that the count, the verdicts, the
 * histogram and the list say the same of such a unit: it conforms. Order is kept; a sorted lot stays sorted.
 * @param offsetsPpm ppm, any order; returned as it is when nothing lies that close
 */
export function settledOnLimits(
  offsetsPpm: Float64Array,
  { lowPpm, highPpm }: Bounds,
): Float64Array {
  const low = lowPpm ?? Infinity;
  const high = highPpm ?? Infinity;
  let settled: Float64Array | null = null;
  for (let i = 0; i < offsetsPpm.length; i += 1) {
    const offsetPpm = offsetsPpm[i]!;
    const onLow = Math.abs(offsetPpm - low) <= ON_LIMIT_PPM;
    if (!onLow && !(Math.abs(offsetPpm - high) <= ON_LIMIT_PPM)) continue;
    const limit = onLow ? low : high;
    if (offsetPpm === limit) continue;
    settled ??= offsetsPpm.slice();
    settled[i] = limit;
  }
  return settled ?? offsetsPpm;
}
