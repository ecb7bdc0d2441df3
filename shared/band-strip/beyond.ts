import { type Frame } from './frame';
import { type Scale } from './scale';
import { type BandStripInput, type BeyondMark, type Side } from './types';

/** A stretch of the axis that units may not leave when they make room for one another. */
interface Stretch {
  fromPpm: number;
  toPpm: number;
  /** Nearest the body of the lot, then outward. */
  innerX: number;
  outerX: number;
  offScale: boolean;
}

export interface BeyondLayout {
  marks: BeyondMark[];
  overflow: Record<Side, number>;
}

/**
 * Places each unit beyond a limit as its own dot: at its value, rounded to a grid as wide as a dot; piled up where
 * values coincide; moved outward where the pile is full. No dot crosses a limit or the receiver's allowance, and what
 * finds no room is counted instead of drawn over another.
 */
export function layoutBeyond(input: BandStripInput, scale: Scale, frame: Frame): BeyondLayout {
  const marks: BeyondMark[] = [];
  const overflow: Record<Side, number> = { low: 0, high: 0 };
  const bySide = splitBySide(input);
  for (const side of ['low', 'high'] as const) {
    const outward = side === 'low' ? -1 : 1;
    const sorted = [...bySide[side]].sort((a, b) => outward * (a - b));
    for (const stretch of stretchesOf(side, scale, frame)) {
      const own = sorted.filter((ppm) => isWithin(ppm, stretch, outward));
      overflow[side] += place(own, stretch, side, scale, frame, marks);
    }
  }
  const unlisted = Math.max(0, input.beyondCount - input.beyondPpm.length);
  const listed = bySide.low.length + bySide.high.length;
  const lowShare =
    listed > 0
      ? bySide.low.length / listed
      : input.highLimitPpm === null
        ? 1
        : input.lowLimitPpm === null
          ? 0
          : 0.5;
  const unlistedLow = Math.round(unlisted * lowShare);
  overflow.low += unlistedLow;
  overflow.high += unlisted - unlistedLow;
  return { marks, overflow };
}

export function splitBySide(input: BandStripInput): Record<Side, number[]> {
  const middle = middleOf(input);
  const low: number[] = [];
  const high: number[] = [];
  for (const ppm of input.beyondPpm) (ppm < middle ? low : high).push(ppm);
  return { low, high };
}

function middleOf({ lowLimitPpm, highLimitPpm, meanPpm }: BandStripInput): number {
  if (lowLimitPpm !== null && highLimitPpm !== null) return (lowLimitPpm + highLimitPpm) / 2;
  if (lowLimitPpm !== null) return Infinity;
  if (highLimitPpm !== null) return -Infinity;
  return meanPpm ?? 0;
}

function isWithin(ppm: number, { fromPpm, toPpm }: Stretch, outward: number): boolean {
  return outward * (ppm - fromPpm) >= 0 && outward * (ppm - toPpm) < 0;
}

function stretchesOf(side: Side, scale: Scale, frame: Frame): Stretch[] {
  const outward = side === 'low' ? -1 : 1;
  const own = scale.sides[side];
  const endPpm = side === 'low' ? scale.lowPpm : scale.highPpm;
  const scaleEndX = side === 'low' ? scale.x1 : scale.x2;
  const infinite = outward * Infinity;
  const startPpm = own.limitPpm ?? endPpm;
  const startX = own.limitPpm === null ? scaleEndX : scale.xOf(own.limitPpm);
  const onScaleEndX = scaleEndX + outward * frame.dotPitch;
  const hasBracketOnScale =
    own.allowancePpm !== null &&
    !own.allowanceOffScale &&
    outward * (own.allowancePpm - startPpm) > 0;
  const result: Stretch[] = [];
  const lastOnScalePpm = own.hasFarUnits
    ? endPpm + outward * 1e-9 * (scale.highPpm - scale.lowPpm)
    : infinite;
  if (hasBracketOnScale) {
    const bracketX = scale.xOf(own.allowancePpm!);
    result.push(
      {
        fromPpm: startPpm,
        toPpm: own.allowancePpm!,
        innerX: startX,
        outerX: bracketX,
        offScale: false,
      },
      {
        fromPpm: own.allowancePpm!,
        toPpm: lastOnScalePpm,
        innerX: bracketX,
        outerX: onScaleEndX,
        offScale: false,
      },
    );
  } else {
    result.push({
      fromPpm: startPpm,
      toPpm: lastOnScalePpm,
      innerX: startX,
      outerX: onScaleEndX,
      offScale: false,
    });
  }
  if (own.hasFarUnits) {
    const laneStart = scaleEndX + outward * (frame.dotPitch + frame.lane * 0.5);
    const laneEnd = scaleEndX + outward * (frame.lane + frame.endPad - frame.dotRadius);
    if (own.allowanceOffScale) {
      const bracketX = offScaleBracketX(side, scale, frame);
      result.push(
        {
          fromPpm: lastOnScalePpm,
          toPpm: own.allowancePpm!,
          innerX: laneStart,
          outerX: bracketX,
          offScale: true,
        },
        {
          fromPpm: own.allowancePpm!,
          toPpm: infinite,
          innerX: bracketX,
          outerX: laneEnd,
          offScale: true,
        },
      );
    } else {
      result.push({
        fromPpm: lastOnScalePpm,
        toPpm: infinite,
        innerX: laneStart,
        outerX: laneEnd,
        offScale: true,
      });
    }
  }
  return result;
}

export function offScaleBracketX(side: Side, scale: Scale, frame: Frame): number {
  return side === 'low' ? scale.x1 - frame.lane : scale.x2 + frame.lane;
}

/** Fills `marks`, returns how many found no room. `values` come sorted outward. */
function place(
  values: readonly number[],
  stretch: Stretch,
  side: Side,
  scale: Scale,
  frame: Frame,
  marks: BeyondMark[],
): number {
  const outward = side === 'low' ? -1 : 1;
  const { dotPitch, dotRadius, stem, axisY, barTop } = frame;
  const gap = dotRadius + 2;
  const room = Math.abs(stretch.outerX - stretch.innerX) - 2 * gap;
  const columns = Math.max(1, Math.floor(room / dotPitch) + 1);
  const levels = Math.max(1, Math.floor((axisY - stem - barTop) / dotPitch) + 1);
  const counts = new Array<number>(columns).fill(0);
  for (const [index, ppm] of values.entries()) {
    const wanted = stretch.offScale
      ? index
      : Math.round((outward * (scale.xOf(ppm) - stretch.innerX) - gap) / dotPitch);
    counts[Math.min(columns - 1, Math.max(0, wanted))]! += 1;
  }
  const unplaced = spread(counts, levels);
  const shown = values.slice(unplaced);
  let next = 0;
  for (const [column, count] of counts.entries()) {
    for (let level = 0; level < count; level += 1) {
      marks.push({
        side,
        ppm: shown[next++]!,
        x: stretch.innerX + outward * (gap + column * dotPitch),
        y: axisY - stem - level * dotPitch,
        stemY: level === 0 ? axisY : null,
        offScale: stretch.offScale,
      });
    }
  }
  return unplaced;
}

/** Levels `counts` in place to at most `levels` a column, outward first, then back inward; returns what is left over. */
function spread(counts: number[], levels: number): number {
  let surplus = 0;
  for (let column = 0; column < counts.length; column += 1) {
    const total = counts[column]! + surplus;
    counts[column] = Math.min(levels, total);
    surplus = total - counts[column]!;
  }
  for (let column = counts.length - 1; column >= 0 && surplus > 0; column -= 1) {
    const total = counts[column]! + surplus;
    counts[column] = Math.min(levels, total);
    surplus = total - counts[column]!;
  }
  return surplus;
}
