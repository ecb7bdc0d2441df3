import { layoutBars } from './bars';
import { layoutBeyond, offScaleBracketX } from './beyond';
import { frameFor, type Frame } from './frame';
import { scaleFor, type Scale } from './scale';
import {
  type BandStripFeature,
  type BandStripGeometry,
  type BandStripInput,
  type BandStripSize,
  type Side,
} from './types';

const sides: readonly Side[] = ['low', 'high'];
const captionRoom = 125;

/**
 * Where everything on a band strip lies, in CSS pixels, for a place `width` wide. The browser, mails and reports all
 * draw from this, so the picture of a lot is the same everywhere.
 */
export function bandStripGeometry(
  input: BandStripInput,
  size: BandStripSize,
  width: number,
): BandStripGeometry {
  const frame = frameFor(size, width);
  let scale = scaleFor(input, width, frame);
  let beyond = layoutBeyond(input, scale, frame);
  if (beyond.overflow.low + beyond.overflow.high > 0) {
    const reserve = {
      low: beyond.overflow.low > 0 ? frame.overflowRoom : 0,
      high: beyond.overflow.high > 0 ? frame.overflowRoom : 0,
    };
    scale = scaleFor(input, width, frame, reserve);
    beyond = layoutBeyond(input, scale, frame);
  }
  const brackets = bracketsOf(scale, frame);
  const posts = postsOf(scale, frame);
  const isEmpty = input.unitsCount === 0;
  const meanX =
    isEmpty || input.meanPpm === null
      ? null
      : Math.min(scale.x2, Math.max(scale.x1, scale.xOf(input.meanPpm)));
  return {
    size,
    width,
    height: frame.height,
    axis: { x1: 0, x2: width, y: frame.axisY },
    breaks: sides
      .filter((side) => scale.sides[side].hasBreak)
      .map((side) =>
        side === 'low' ? scale.x1 - frame.lane * 0.28 : scale.x2 + frame.lane * 0.28,
      ),
    zeroX: scale.lowPpm <= 0 && scale.highPpm >= 0 ? scale.xOf(0) : null,
    brackets,
    posts,
    guards: guardsOf(input, scale, frame),
    bars: isEmpty ? [] : layoutBars(input, scale, frame),
    meanX,
    dotRadius: frame.dotRadius,
    marks: beyond.marks,
    overflow: sides
      .filter((side) => beyond.overflow[side] > 0)
      .map((side) => ({
        side,
        count: beyond.overflow[side],
        x: side === 'low' ? 1 : width - 1,
        y: frame.axisY - frame.stem,
      })),
    labels: frame.labelY === null ? [] : labelsOf(scale, frame, brackets, beyond.marks, width),
    captionX: captionX(scale, frame, brackets, beyond.marks),
    features: featuresOf(input, brackets, beyond.marks, posts, meanX),
    isEmpty,
  };
}

function bracketsOf(scale: Scale, frame: Frame): BandStripGeometry['brackets'] {
  return sides.flatMap((side) => {
    const { allowancePpm, allowanceOffScale } = scale.sides[side];
    if (allowancePpm === null) return [];
    const x = allowanceOffScale ? offScaleBracketX(side, scale, frame) : scale.xOf(allowancePpm);
    const { bracketTop, axisY, lip } = frame;
    return [
      {
        side,
        ppm: allowancePpm,
        x,
        top: bracketTop,
        bottom: axisY,
        lip,
        offScale: allowanceOffScale,
      },
    ];
  });
}

function postsOf(scale: Scale, frame: Frame): BandStripGeometry['posts'] {
  return sides.flatMap((side) => {
    const { limitPpm } = scale.sides[side];
    if (limitPpm === null) return [];
    return [
      { side, ppm: limitPpm, x: scale.xOf(limitPpm), top: frame.postTop, bottom: frame.axisY + 3 },
    ];
  });
}

function guardsOf(input: BandStripInput, scale: Scale, frame: Frame): BandStripGeometry['guards'] {
  const { lowLimitPpm, highLimitPpm, guardBandPpm } = input;
  if (!(guardBandPpm > 0)) return [];
  const half =
    lowLimitPpm !== null && highLimitPpm !== null ? (highLimitPpm - lowLimitPpm) / 2 : Infinity;
  const band = Math.min(guardBandPpm, half);
  const guards: BandStripGeometry['guards'] = [];
  const { postTop: top, axisY: bottom } = frame;
  if (lowLimitPpm !== null) {
    guards.push({
      side: 'low',
      x1: scale.xOf(lowLimitPpm),
      x2: scale.xOf(Math.min(lowLimitPpm + band, scale.highPpm)),
      top,
      bottom,
    });
  }
  if (highLimitPpm !== null) {
    guards.push({
      side: 'high',
      x1: scale.xOf(Math.max(highLimitPpm - band, scale.lowPpm)),
      x2: scale.xOf(highLimitPpm),
      top,
      bottom,
    });
  }
  return guards;
}

/** Limits first, then the allowance, then the farthest unit past a break, then the nominal value: what is told first keeps its place when two would overlap. */
function labelsOf(
  scale: Scale,
  frame: Frame,
  brackets: BandStripGeometry['brackets'],
  marks: BandStripGeometry['marks'],
  width: number,
): BandStripGeometry['labels'] {
  const wanted: { ppm: number; x: number }[] = [];
  for (const side of sides) {
    const { limitPpm } = scale.sides[side];
    if (limitPpm !== null) wanted.push({ ppm: limitPpm, x: scale.xOf(limitPpm) });
  }
  for (const { ppm, x } of brackets) wanted.push({ ppm, x });
  for (const side of sides) {
    const far = marks.filter((mark) => mark.offScale && mark.side === side).at(-1);
    if (far) wanted.push({ ppm: far.ppm, x: far.x });
  }
  if (scale.lowPpm <= 0 && scale.highPpm >= 0) wanted.push({ ppm: 0, x: scale.xOf(0) });
  const rightmost = wanted.reduce((x, label) => Math.max(x, label.x), -Infinity);
  const taken: { from: number; to: number }[] = [];
  const labels: BandStripGeometry['labels'] = [];
  for (const { ppm, x } of wanted) {
    const withUnit = x === rightmost;
    const half = withUnit ? 34 : 20;
    const anchor = x - half < 0 ? 'start' : x + half > width ? 'end' : 'middle';
    const labelX = anchor === 'start' ? 0 : anchor === 'end' ? width : x;
    const from = anchor === 'start' ? 0 : anchor === 'end' ? width - 2 * half : x - half;
    const to = from + 2 * half;
    if (taken.some((other) => from < other.to && to > other.from)) continue;
    taken.push({ from, to });
    labels.push({ ppm, x: labelX, y: frame.labelY!, anchor, withUnit });
  }
  return labels;
}

/** Room for the words "receiver allowance" inside the right-hand bracket, if there is any. */
function captionX(
  scale: Scale,
  frame: Frame,
  brackets: BandStripGeometry['brackets'],
  marks: BandStripGeometry['marks'],
): number | null {
  const right = brackets.find(({ side }) => side === 'high');
  if (frame.labelY === null || right === undefined || right.offScale) return null;
  const { limitPpm } = scale.sides.high;
  const innerX = limitPpm === null ? scale.x2 : scale.xOf(limitPpm);
  const from = Math.max(innerX, right.x - captionRoom);
  const isTaken = marks.some(
    (mark) => mark.x > from && mark.x < right.x && mark.y < frame.barTop + 16,
  );
  return right.x - innerX > captionRoom && !isTaken ? right.x - frame.lip - 3 : null;
}

function featuresOf(
  input: BandStripInput,
  brackets: BandStripGeometry['brackets'],
  marks: BandStripGeometry['marks'],
  posts: BandStripGeometry['posts'],
  meanX: number | null,
): BandStripFeature[] {
  const features: BandStripFeature[] = [
    ...brackets.map(({ side, ppm, x }) => ({ kind: 'allowance' as const, side, ppm, x })),
    ...posts.map(({ side, ppm, x }) => ({
      kind: 'limit' as const,
      side,
      ppm,
      x,
    })),
    ...marks.map(({ side, ppm, x }) => ({ kind: 'beyond' as const, side, ppm, x })),
  ];
  if (meanX !== null && input.meanPpm !== null) {
    features.push({ kind: 'mean', side: null, ppm: input.meanPpm, x: meanX });
  }
  return features.sort((a, b) => a.ppm - b.ppm);
}
