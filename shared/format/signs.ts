export interface NumberSigns {
  decimal: '.' | ',';
  /** Between thousands. */
  group: string;
}

/** What records, mails and reports are written with, whoever reads them. */
export const neutralSigns: NumberSigns = { decimal: '.', group: ',' };

let source: () => NumberSigns = () => neutralSigns;

/** The signs every number is written with from now on. A source, so that a page can follow a change of the setting. */
export function readSignsFrom(given: () => NumberSigns): void {
  source = given;
}

export function numberSigns(): NumberSigns {
  return source();
}

/**
 * The signs of a locale. Where it writes a decimal comma, thousands are kept apart by a space and never by a point, so that
 * '1.234' cannot be read as two numbers a thousand times apart. Source: SI Brochure, 9th edition, 5.4.4 (from memory).
 *
 * @param parts a number of at least five whole digits and a fraction, as Intl.NumberFormat takes it apart
 */
export function signsOf(parts: readonly { type: string; value: string }[]): NumberSigns {
  const sign = (type: string) => parts.find((part) => part.type === type)?.value;
  if (sign('decimal') === ',') return { decimal: ',', group: '\u00a0' };
  const group = sign('group');
  // Narrow spaces are not in the typeface shipped with the product.
  if (group !== undefined && /\s/.test(group)) return { decimal: '.', group: '\u00a0' };
  return { decimal: '.', group: group === '\u2019' || group === "'" ? '\u2019' : ',' };
}
