import { bandStripGeometry } from '@shared/band-strip/geometry';
import { bandStripSentence, bandStripWords } from '@shared/band-strip/sentence';
import { bandStripShapes, type BandStripShape } from '@shared/band-strip/shapes';
import { paperTones } from '@shared/band-strip/svg';
import { type BandStripInput } from '@shared/band-strip/types';
import { type Sheet } from './sheet';

/** The strip is laid out in CSS pixels, 96 to the inch; paper counts 72 points to the inch. */
const pointsPerPixel = 0.75;

/** The band strip as vectors, from the same geometry as on the screen, with its sentence below. */
export function drawBandStrip(sheet: Sheet, input: BandStripInput): void {
  const geometry = bandStripGeometry(input, 'page', sheet.width / pointsPerPixel);
  const height = geometry.height * pointsPerPixel;
  sheet.need(height + 16);
  for (const shape of bandStripShapes(geometry, bandStripWords)) paint(sheet, shape);
  sheet.space(height + 3);
  sheet.paragraph(bandStripSentence(input), { size: 8.5, ink: 'soft' });
}

function paint(sheet: Sheet, shape: BandStripShape): void {
  const { doc, left, y: top } = sheet;
  const colour = paperTones[shape.tone];
  const x = (value: number) => left + value * pointsPerPixel;
  const y = (value: number) => top + value * pointsPerPixel;
  switch (shape.kind) {
    case 'line':
      doc
        .moveTo(x(shape.x1), y(shape.y1))
        .lineTo(x(shape.x2), y(shape.y2))
        .lineWidth(shape.width * pointsPerPixel)
        .stroke(colour);
      return;
    case 'rect':
      doc
        .rect(x(shape.x), y(shape.y), shape.width * pointsPerPixel, shape.height * pointsPerPixel)
        .fill(colour);
      return;
    case 'dot':
      doc.circle(x(shape.x), y(shape.y), shape.radius * pointsPerPixel).fill(colour);
      return;
    case 'path': {
      const [first, ...rest] = shape.points;
      doc.moveTo(x(first![0]), y(first![1]));
      for (const [px, py] of rest) doc.lineTo(x(px), y(py));
      if (shape.filled) doc.closePath().fill(colour);
      else doc.lineWidth(shape.width * pointsPerPixel).stroke(colour);
      return;
    }
    case 'text': {
      const size = shape.size * pointsPerPixel;
      const ink = shape.tone === 'beyond' ? 'rose' : 'soft';
      const width = 200;
      const from = { start: 0, middle: width / 2, end: width }[shape.anchor];
      const style = { size, ink, width } as const;
      // SVG sets text on its baseline; here its top is given, about three quarters of the size above.
      const at = y(shape.y) - size * 0.92;
      if (shape.anchor === 'end')
        sheet.line(shape.text, at, { ...style, x: x(shape.x) - from, align: 'right' });
      else if (shape.anchor === 'start') sheet.line(shape.text, at, { ...style, x: x(shape.x) });
      else sheet.lineCentred(shape.text, x(shape.x), at, style);
    }
  }
}
