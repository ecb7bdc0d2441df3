import { type Frame } from './frame';
import { type BandStripInput, type Side } from './types';

export interface SideScale {
  limitPpm: number | null;
  allowancePpm: number | null;
  allowanceOffScale: boolean;
  /** Some unit beyond lies past the end of the scale. */
  hasFarUnits: boolean;
  hasBreak: boolean;
}

export interface Scale {
  lowPpm: number;
  highPpm: number;
  x1: number;
  x2: number;
  sides: Record<Side, SideScale>;
  xOf(ppm: number): number;
}

/** An allowance wider than this many spans of limits and units would squeeze the units to a line; it goes past a break. */
const allowanceReach = 2.5;
/** Units further out than this many spans go past a break. */
const unitReach = 0.5;

/**
 * The ppm axis: limits, the body of the units and the nominal value are always on it; the allowance and the units
 * beyond are too, unless they lie so far outside that nothing else could be read.
 */
export function scaleFor(
  input: BandStripInput,
  width: number,
  frame: Frame,
  reserve: Record<Side, number> = { low: 0, high: 0 },
): Scale {
  const core = coreRange(input);
  const coreSpan = core.high - core.low;
  let { low, high } = core;
  const { allowanceLowPpm, allowanceHighPpm } = input;
  const lowAllowanceOff =
    allowanceLowPpm !== null && core.low - allowanceLowPpm > allowanceReach * coreSpan;
  const highAllowanceOff =
    allowanceHighPpm !== null && allowanceHighPpm - core.high > allowanceReach * coreSpan;
  if (allowanceLowPpm !== null && !lowAllowanceOff) low = Math.min(low, allowanceLowPpm);
  if (allowanceHighPpm !== null && !highAllowanceOff) high = Math.max(high, allowanceHighPpm);

  const span = high - low;
  const reachLow = low - unitReach * span;
  const reachHigh = high + unitReach * span;
  let farLow = false;
  let farHigh = false;
  for (const ppm of input.beyondPpm) {
    if (ppm < reachLow) farLow = true;
    else if (ppm > reachHigh) farHigh = true;
    else {
      low = Math.min(low, ppm);
      high = Math.max(high, ppm);
    }
  }

  const lowBreak = farLow || lowAllowanceOff;
  const highBreak = farHigh || highAllowanceOff;
  const x1 = frame.endPad + reserve.low + (lowBreak ? frame.lane : 0);
  const x2 = Math.max(x1 + 1, width - frame.endPad - reserve.high - (highBreak ? frame.lane : 0));
  const perPpm = (x2 - x1) / (high - low);
  return {
    lowPpm: low,
    highPpm: high,
    x1,
    x2,
    sides: {
      low: {
        limitPpm: input.lowLimitPpm,
        allowancePpm: allowanceLowPpm,
        allowanceOffScale: lowAllowanceOff,
        hasFarUnits: farLow,
        hasBreak: lowBreak,
      },
      high: {
        limitPpm: input.highLimitPpm,
        allowancePpm: allowanceHighPpm,
        allowanceOffScale: highAllowanceOff,
        hasFarUnits: farHigh,
        hasBreak: highBreak,
      },
    },
    xOf: (ppm) => x1 + (ppm - low) * perPpm,
  };
}

function coreRange(input: BandStripInput): { low: number; high: number } {
  const { lowLimitPpm, highLimitPpm, histogram } = input;
  const values = [0, lowLimitPpm, highLimitPpm].filter((value) => value !== null);
  for (const [index, count] of histogram.counts.entries()) {
    const from = histogram.edgesPpm[index];
    const to = histogram.edgesPpm[index + 1];
    if (count === 0 || from === undefined || to === undefined) continue;
    values.push(Math.max(from, lowLimitPpm ?? from), Math.min(to, highLimitPpm ?? to));
  }
  if (values.length === 1) {
    for (const value of [input.allowanceLowPpm, input.allowanceHighPpm])
      if (value !== null) values.push(value);
  }
  let low = Infinity;
  let high = -Infinity;
  for (const value of values) {
    const held = Math.min(Math.max(value, lowLimitPpm ?? -Infinity), highLimitPpm ?? Infinity);
    low = Math.min(low, held);
    high = Math.max(high, held);
  }
  if (high > low) return { low, high };
  return { low: low - 1, high: high + 1 };
}
