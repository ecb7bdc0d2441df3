import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type PDFDocument from 'pdfkit';

export type Weight = 400 | 600;
type Doc = InstanceType<typeof PDFDocument>;

/** The typeface comes in one file for each script; the first that has the sign writes it. */
const scripts = [
  'latin',
  'latin-ext',
  'greek',
  'cyrillic',
  'vietnamese',
  'greek-ext',
  'cyrillic-ext',
] as const;
const bytes = new Map<string, Buffer>();

function fileOf(face: string): Buffer {
  let found = bytes.get(face);
  if (!found) {
    const [script, weight] = face.split('/');
    const path = createRequire(import.meta.url).resolve(
      `@fontsource/source-sans-3/files/source-sans-3-${script}-${weight}-normal.woff`,
    );
    bytes.set(face, (found = readFileSync(path)));
  }
  return found;
}

export interface Run {
  face: string;
  text: string;
}

/** Text cut into runs of one face each. A sign that no face has is written as its code point, never left out. */
export class Faces {
  private readonly registered = new Set<string>();
  constructor(private readonly doc: Doc) {}

  runs(text: string, weight: Weight): Run[] {
    const runs: Run[] = [];
    for (const sign of text) {
      const face = this.faceFor(sign.codePointAt(0)!, weight);
      const shown = face ? sign : `[U+${sign.codePointAt(0)!.toString(16).toUpperCase()}]`;
      const used = face ?? `latin/${weight}`;
      const last = runs.at(-1);
      if (last?.face === used) last.text += shown;
      else runs.push({ face: used, text: shown });
    }
    return runs;
  }

  width(text: string, weight: Weight, size: number): number {
    return this.runs(text, weight).reduce((sum, run) => {
      this.use(run.face, size);
      return sum + this.doc.widthOfString(run.text);
    }, 0);
  }

  use(face: string, size: number): void {
    if (!this.registered.has(face)) {
      this.doc.registerFont(face, fileOf(face));
      this.registered.add(face);
    }
    this.doc.font(face).fontSize(size);
  }

  private faceFor(codePoint: number, weight: Weight): string | null {
    for (const script of scripts) {
      const face = `${script}/${weight}`;
      this.use(face, 10);
      if (glyphsOf(this.doc).hasGlyphForCodePoint(codePoint)) return face;
    }
    return null;
  }
}

/** The opened font of pdfkit knows its signs; the library does not show it by type. */
function glyphsOf(doc: Doc): { hasGlyphForCodePoint(codePoint: number): boolean } {
  return (
    doc as unknown as { _font: { font: { hasGlyphForCodePoint(codePoint: number): boolean } } }
  )._font.font;
}
