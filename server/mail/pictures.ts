import { Resvg } from '@resvg/resvg-js';
import { bandStripSvg, paperTones } from '@shared/band-strip/svg';
import { type BandStripInput } from '@shared/band-strip/types';
import { markSvg } from '@shared/brand/mark';
import { fontFile } from './font';
import { type MailPicture } from './message';

/** Twice the size it is shown at, for dense screens. */
const density = 2;
export const stripWidthPx = 560;

function png(svg: string, widthPx: number): string {
  const drawing = new Resvg(svg, {
    fitTo: { mode: 'width', value: widthPx * density },
    font: {
      fontFiles: [fontFile()],
      loadSystemFonts: false,
      defaultFontFamily: 'Source Sans 3',
    },
  });
  return drawing.render().asPng().toString('base64');
}

/** A picture must never keep a mail from being written: whoever gets it reads the words instead. */
function drawn(draw: () => MailPicture): MailPicture | null {
  try {
    return draw();
  } catch {
    return null;
  }
}

const strips = new WeakMap<object, MailPicture | null>();

/** The band strip as PNG: mail programs show no SVG. The same strip to several people is drawn once. */
export function bandStripPicture(strip: BandStripInput): MailPicture | null {
  const known = strips.get(strip);
  if (known !== undefined) return known;
  const picture = drawn(() => ({
    cid: 'band-strip@quartzhold',
    fileName: 'band-strip.png',
    mediaType: 'image/png',
    base64: png(
      bandStripSvg(strip, { size: 'page', width: stripWidthPx, fontFamily: 'Source Sans 3' }),
      stripWidthPx,
    ),
  }));
  strips.set(strip, picture);
  return picture;
}

let mark: MailPicture | null | undefined;
export function markPicture(): MailPicture | null {
  return (mark ??= drawn(() => ({
    cid: 'mark@quartzhold',
    fileName: 'quartzhold.png',
    mediaType: 'image/png',
    base64: png(markSvg({ blank: paperTones.ink, bands: paperTones.allowance }, 24), 24),
  })));
}
