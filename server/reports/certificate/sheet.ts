import PDFDocument from 'pdfkit';
import { paperTones } from '@shared/band-strip/svg';
import { mark } from '@shared/brand/mark';
import { Faces, type Weight } from './faces';

/** The light palette of the product, for paper. */
export const inks = {
  ink: paperTones.ink,
  soft: paperTones.soft,
  line: '#dcd5cf',
  amethyst: paperTones.allowance,
  rose: paperTones.beyond,
  prase: '#2f6b4a',
  citrine: '#8f6200',
  bars: paperTones.bars,
} as const;
export type Ink = keyof typeof inks;

export interface TextStyle {
  size?: number;
  weight?: Weight;
  ink?: Ink;
  /** Left edge and width in points; the column by default. */
  x?: number;
  width?: number;
  align?: 'left' | 'right';
}

const margin = { left: 56, right: 56, top: 44, bottom: 60 };
const leading = 1.32;

export interface SheetInfo {
  title: string;
  /** The only time in the file: that of the last signature, so that the file is the same whenever it is made. */
  at: Date;
}

/** A4 pages that text and drawings flow down. Lines are laid out here, so that mixed scripts wrap like one typeface. */
export class Sheet {
  readonly doc: InstanceType<typeof PDFDocument>;
  readonly left = margin.left;
  readonly width: number;
  y = margin.top;
  private readonly faces: Faces;
  private readonly done: Promise<Buffer>;

  constructor({ title, at }: SheetInfo) {
    this.doc = new PDFDocument({
      size: 'A4',
      margin: 0,
      bufferPages: true,
      lang: 'en',
      displayTitle: true,
      pdfVersion: '1.7',
      info: {
        Title: title,
        Creator: 'Quartzhold',
        Producer: 'Quartzhold',
        CreationDate: at,
        ModDate: at,
      },
    });
    this.width = this.doc.page.width - margin.left - margin.right;
    this.faces = new Faces(this.doc);
    const pieces: Buffer[] = [];
    this.doc.on('data', (piece: Buffer) => pieces.push(piece));
    this.done = new Promise((resolve, reject) => {
      this.doc.on('end', () => resolve(Buffer.concat(pieces)));
      this.doc.on('error', reject);
    });
  }

  get bottom(): number {
    return this.doc.page.height - margin.bottom;
  }

  /** Begins a page unless `height` points are left on this one. */
  need(height: number): void {
    if (this.y + height <= this.bottom) return;
    this.doc.addPage();
    this.y = margin.top;
  }

  space(height: number): void {
    this.y += height;
  }

  rule(): void {
    this.doc
      .moveTo(this.left, this.y)
      .lineTo(this.left + this.width, this.y)
      .lineWidth(0.5)
      .stroke(inks.line);
  }

  /** A paragraph at the place the sheet has reached; breaks across pages between lines. */
  paragraph(text: string, style: TextStyle = {}): void {
    const size = style.size ?? 9.5;
    for (const line of this.lines(text, style)) {
      this.need(size * leading);
      this.line(line, this.y, style);
      this.y += size * leading;
    }
  }

  /** Height that a paragraph will take. */
  heightOf(text: string, style: TextStyle = {}): number {
    return this.lines(text, style).length * (style.size ?? 9.5) * leading;
  }

  /** One line at `y`, neither wrapped nor moving the sheet on. */
  line(text: string, y: number, style: TextStyle = {}): void {
    const { size = 9.5, weight = 400, ink = 'ink', x = this.left, width = this.width } = style;
    let at = style.align === 'right' ? x + width - this.faces.width(text, weight, size) : x;
    for (const run of this.faces.runs(text, weight)) {
      this.faces.use(run.face, size);
      this.doc.fillColor(inks[ink]).text(run.text, at, y, { lineBreak: false });
      at += this.doc.widthOfString(run.text);
    }
  }

  lineCentred(text: string, x: number, y: number, style: TextStyle = {}): void {
    const width = this.faces.width(text, style.weight ?? 400, style.size ?? 9.5);
    this.line(text, y, { ...style, x: x - width / 2 });
  }

  lines(text: string, { size = 9.5, weight = 400, width = this.width }: TextStyle): string[] {
    const lines: string[] = [];
    for (const paragraph of text.split(/\r?\n/)) {
      let line = '';
      for (const word of paragraph.split(' ').flatMap((w) => this.broken(w, weight, size, width))) {
        const longer = line === '' ? word : `${line} ${word}`;
        if (line !== '' && this.faces.width(longer, weight, size) > width) {
          lines.push(line);
          line = word;
        } else line = longer;
      }
      lines.push(line);
    }
    return lines;
  }

  /** A word wider than its column is cut into pieces that fit. */
  private broken(word: string, weight: Weight, size: number, width: number): string[] {
    if (this.faces.width(word, weight, size) <= width) return [word];
    const pieces: string[] = [];
    let piece = '';
    for (const sign of word) {
      if (piece !== '' && this.faces.width(piece + sign, weight, size) > width) {
        pieces.push(piece);
        piece = '';
      }
      piece += sign;
    }
    return [...pieces, piece];
  }

  drawMark(x: number, y: number, size: number): void {
    this.doc
      .save()
      .translate(x, y)
      .scale(size / 24)
      .lineWidth(mark.strokeWidth)
      .lineJoin('round');
    this.doc.path(mark.bands).stroke(inks.amethyst);
    this.doc.path(mark.blank).stroke(inks.ink);
    this.doc.restore();
  }

  /** Ends the file with the foot of every page, which counts them. */
  end(foot: { left: string; caution: string }): Promise<Buffer> {
    const { start, count } = this.doc.bufferedPageRange();
    for (let index = 0; index < count; index += 1) {
      this.doc.switchToPage(start + index);
      this.y = this.bottom + 12;
      this.rule();
      const style = { size: 7.5, ink: 'soft' } as const;
      this.line(foot.caution, this.y + 6, style);
      this.line(foot.left, this.y + 18, { ...style, width: this.width - 90 });
      this.line(`page ${index + 1} of ${count}`, this.y + 18, { ...style, align: 'right' });
    }
    this.doc.end();
    return this.done;
  }
}
