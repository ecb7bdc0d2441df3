import { type BandStripGeometry } from './types';

/** What a shape is drawn in; each medium maps these to its own colours. */
export type Tone = 'ink' | 'soft' | 'axis' | 'bars' | 'hatch' | 'allowance' | 'beyond';

export type BandStripShape =
  | { kind: 'line'; tone: Tone; x1: number; y1: number; x2: number; y2: number; width: number }
  | { kind: 'rect'; tone: Tone; x: number; y: number; width: number; height: number }
  | { kind: 'dot'; tone: Tone; x: number; y: number; radius: number }
  | { kind: 'path'; tone: Tone; points: [number, number][]; filled: boolean; width: number }
  | {
      kind: 'text';
      tone: Tone;
      x: number;
      y: number;
      anchor: 'start' | 'middle' | 'end';
      size: number;
      text: string;
    };

export type HatchStroke = Extract<BandStripShape, { kind: 'line' }>;

export interface BandStripWords {
  allowance: string;
  empty: string;
  ppm(value: number): string;
  ppmWithUnit(value: number): string;
  more(count: number): string;
}

/** The drawing as a flat list, back to front: SVG in the browser, SVG text in a mail and a PDF are painted from it. */
export function bandStripShapes(
  geometry: BandStripGeometry,
  words: BandStripWords,
): BandStripShape[] {
  const { axis, size } = geometry;
  const isPage = size === 'page';
  const shapes: BandStripShape[] = [];
  const line = (tone: Tone, x1: number, y1: number, x2: number, y2: number, width = 1) =>
    shapes.push({
      kind: 'line',
      tone,
      x1: half(x1),
      y1: half(y1),
      x2: half(x2),
      y2: half(y2),
      width,
    });

  for (const { x1, x2, top, bottom } of geometry.guards) {
    for (const stroke of hatch(x1, x2, top, bottom, isPage ? 5 : 4)) shapes.push(stroke);
  }
  for (const bar of geometry.bars) {
    shapes.push({
      kind: 'rect',
      tone: 'bars',
      x: bar.x,
      y: bar.y,
      width: bar.width,
      height: bar.height,
    });
  }
  drawAxis(geometry, line);
  for (const { x, top, bottom, lip, side, offScale } of geometry.brackets) {
    const inward = side === 'low' ? lip : -lip;
    const pen = isPage ? 1.75 : 1.5;
    shapes.push({
      kind: 'path',
      tone: 'allowance',
      points: [
        [x + inward, top + 1],
        [x, top + 1],
        [x, bottom],
        [x + inward, bottom],
      ],
      filled: false,
      width: pen,
    });
    if (offScale) {
      const middle = (top + bottom) / 2;
      shapes.push({
        kind: 'path',
        tone: 'allowance',
        points: [
          [x, middle - 4],
          [x - inward, middle],
          [x, middle + 4],
        ],
        filled: true,
        width: 0,
      });
    }
  }
  for (const { x, top, bottom } of geometry.posts) {
    shapes.push({ kind: 'line', tone: 'ink', x1: x, y1: top, x2: x, y2: bottom, width: 2 });
  }
  if (geometry.meanX !== null) {
    const x = geometry.meanX;
    const reach = isPage ? 4.5 : 3.5;
    shapes.push({
      kind: 'path',
      tone: 'ink',
      points: [
        [x, axis.y + 1],
        [x + reach, axis.y + 1 + reach * 1.25],
        [x - reach, axis.y + 1 + reach * 1.25],
      ],
      filled: true,
      width: 0,
    });
  }
  for (const { x, y, stemY } of geometry.marks) {
    if (stemY !== null)
      shapes.push({
        kind: 'line',
        tone: 'beyond',
        x1: x,
        y1: y,
        x2: x,
        y2: stemY,
        width: isPage ? 1.5 : 1.25,
      });
    shapes.push({ kind: 'dot', tone: 'beyond', x, y, radius: geometry.dotRadius });
  }
  addTexts(geometry, words, shapes);
  return shapes;
}

function drawAxis(
  { axis, breaks, zeroX, size }: BandStripGeometry,
  line: (tone: Tone, x1: number, y1: number, x2: number, y2: number) => void,
): void {
  let from = axis.x1;
  for (const x of [...breaks].sort((a, b) => a - b)) {
    line('axis', from, axis.y, x - 3, axis.y);
    line('axis', x - 5, axis.y + 4, x - 1, axis.y - 4);
    line('axis', x + 1, axis.y + 4, x + 5, axis.y - 4);
    from = x + 3;
  }
  line('axis', from, axis.y, axis.x2, axis.y);
  if (zeroX !== null) line('axis', zeroX, axis.y, zeroX, axis.y + (size === 'page' ? 5 : 3));
}

function addTexts(
  geometry: BandStripGeometry,
  words: BandStripWords,
  shapes: BandStripShape[],
): void {
  const size = geometry.size === 'page' ? 12.5 : 11;
  for (const { side, count, x, y } of geometry.overflow) {
    shapes.push({
      kind: 'text',
      tone: 'beyond',
      x,
      y: y + 3,
      anchor: side === 'low' ? 'start' : 'end',
      size,
      text: words.more(count),
    });
  }
  for (const { ppm, x, y, anchor, withUnit } of geometry.labels) {
    shapes.push({
      kind: 'text',
      tone: 'soft',
      x,
      y,
      anchor,
      size,
      text: withUnit ? words.ppmWithUnit(ppm) : words.ppm(ppm),
    });
  }
  if (geometry.captionX !== null) {
    shapes.push({
      kind: 'text',
      tone: 'soft',
      x: geometry.captionX,
      y: 14,
      anchor: 'end',
      size,
      text: words.allowance,
    });
  }
  if (geometry.isEmpty) {
    const x = geometry.zeroX ?? geometry.width / 2;
    shapes.push({
      kind: 'text',
      tone: 'soft',
      x,
      y: geometry.axis.y - (geometry.size === 'page' ? 20 : 9),
      anchor: 'middle',
      size,
      text: words.empty,
    });
  }
}

/** Strokes at 45 degrees, cut to the rectangle here, so that no medium needs a pattern or a clip. */
export function hatch(
  x1: number,
  x2: number,
  top: number,
  bottom: number,
  spacing: number,
): HatchStroke[] {
  const strokes: HatchStroke[] = [];
  const height = bottom - top;
  for (let start = x1 - height + spacing; start < x2; start += spacing) {
    const fromX = Math.max(start, x1);
    const toX = Math.min(start + height, x2);
    if (toX - fromX < 0.5) continue;
    strokes.push({
      kind: 'line',
      tone: 'hatch',
      x1: fromX,
      y1: bottom - (fromX - start),
      x2: toX,
      y2: bottom - (toX - start),
      width: 0.75,
    });
  }
  return strokes;
}

/** Hairlines sit in the middle of a pixel, or they blur. */
function half(value: number): number {
  return Math.floor(value) + 0.5;
}
