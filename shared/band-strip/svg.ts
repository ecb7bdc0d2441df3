import { bandStripGeometry } from './geometry';
import { bandStripSentence, bandStripWords } from './sentence';
import { bandStripShapes, type BandStripShape, type BandStripWords, type Tone } from './shapes';
import { type BandStripInput, type BandStripSize } from './types';

/** The light palette of src/styles/tokens.css, for mails and printed reports; a test keeps the two alike. */
export const paperTones: Record<Tone, string> = {
  ink: '#2c2729',
  soft: '#6d6467',
  axis: '#8f8588',
  bars: '#938aa8',
  hatch: '#8f8588',
  allowance: '#5d4690',
  beyond: '#a3304f',
};

export interface BandStripSvgOptions {
  size?: BandStripSize;
  width?: number;
  tones?: Record<Tone, string>;
  words?: BandStripWords;
  fontFamily?: string;
}

/** The band strip as a complete SVG document in text, titled with its sentence. */
export function bandStripSvg(
  input: BandStripInput,
  {
    size = 'page',
    width = size === 'page' ? 640 : 300,
    tones = paperTones,
    words = bandStripWords,
    fontFamily = "'Source Sans 3', Arial, sans-serif",
  }: BandStripSvgOptions = {},
): string {
  const geometry = bandStripGeometry(input, size, width);
  const body = bandStripShapes(geometry, words)
    .map((shape) => element(shape, tones))
    .join('');
  const { height } = geometry;
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" role="img" width="${width}" height="${height}" ` +
    `viewBox="0 0 ${width} ${height}" font-family="${escape(fontFamily)}">` +
    `<title>${escape(bandStripSentence(input))}</title>${body}</svg>`
  );
}

function element(shape: BandStripShape, tones: Record<Tone, string>): string {
  const colour = escape(tones[shape.tone]);
  switch (shape.kind) {
    case 'line':
      return `<line x1="${n(shape.x1)}" y1="${n(shape.y1)}" x2="${n(shape.x2)}" y2="${n(shape.y2)}" stroke="${colour}" stroke-width="${shape.width}"/>`;
    case 'rect':
      return `<rect x="${n(shape.x)}" y="${n(shape.y)}" width="${n(shape.width)}" height="${n(shape.height)}" fill="${colour}"/>`;
    case 'dot':
      return `<circle cx="${n(shape.x)}" cy="${n(shape.y)}" r="${n(shape.radius)}" fill="${colour}"/>`;
    case 'path':
      return shape.filled
        ? `<path d="${pathData(shape.points, true)}" fill="${colour}"/>`
        : `<path d="${pathData(shape.points, false)}" fill="none" stroke="${colour}" stroke-width="${shape.width}"/>`;
    case 'text':
      return `<text x="${n(shape.x)}" y="${n(shape.y)}" text-anchor="${shape.anchor}" font-size="${shape.size}" fill="${colour}">${escape(shape.text)}</text>`;
  }
}

/** `M x y L x y …`, closed for a filled figure. */
export function pathData(points: readonly (readonly [number, number])[], closed: boolean): string {
  const moves = points.map(([x, y], index) => `${index === 0 ? 'M' : 'L'}${n(x)} ${n(y)}`).join('');
  return closed ? `${moves}Z` : moves;
}

function n(value: number): string {
  return String(Math.round(value * 100) / 100);
}

function escape(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`);
}
