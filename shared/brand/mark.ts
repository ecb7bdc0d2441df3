/**
 * Our mark: a quartz blank seen from its edge, barrel-shaped, held by two bands. 24 by 24, drawn in strokes of 1.75.
 * The word mark, the favicon and the header of mails draw these same lines.
 */
export const mark = {
  viewBox: '0 0 24 24',
  strokeWidth: 1.75,
  blank: 'M8.1 2.9H15.9C19 8.6 19 15.4 15.9 21.1H8.1C5 15.4 5 8.6 8.1 2.9Z',
  bands: 'M6.1 9.1H17.9M6.1 14.9H17.9',
} as const;

export interface MarkColours {
  blank: string;
  bands: string;
}

/** The mark as a complete SVG document in text. */
export function markSvg({ blank, bands }: MarkColours, sizePx = 24): string {
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" width="${sizePx}" height="${sizePx}" viewBox="${mark.viewBox}" ` +
    `fill="none" stroke-width="${mark.strokeWidth}" stroke-linejoin="round">` +
    `<path d="${mark.bands}" stroke="${bands}"/><path d="${mark.blank}" stroke="${blank}"/></svg>`
  );
}
