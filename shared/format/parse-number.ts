export type ParsedNumber =
  | {
      ok: true;
      value: number;
      /** The same number in plain form, no digit lost: '-1234.50'. */ canonical: string;
    }
  | { ok: false; message: string };

export interface ParseOptions {
  /** Settles the decimal sign when the writer's habit is known, e.g. from the other rows of a column. */
  decimalSign?: '.' | ',';
  /** The decimal sign of the writer's locale: it settles what could be read twice and nothing else. */
  usualSign?: '.' | ',';
}

const refuse = (message: string): ParsedNumber => ({ ok: false, message });

/**
 * A number as people type it, with a point or a comma as decimal sign, spaces, apostrophes or the other sign
 * between thousands, U+2212 or a hyphen as minus, and an exponent if wanted.
 * One point is a decimal point. One comma followed by exactly three digits ('1,234') could be either and is
 * refused unless the writer is known to use a decimal comma, as is any grouping that is not in threes ('1.234,5,6').
 */
export function parseNumber(
  text: string,
  { decimalSign, usualSign }: ParseOptions = {},
): ParsedNumber {
  const cleaned = text
    .trim()
    .replace(/^[\u2212\u2013]/, '-')
    .replace(/[eE][\u2212]/, 'e-');
  if (cleaned === '') return refuse('Write a number.');
  const match = /^([+-]?)([\d.,\s'\u2019]*\d[\d.,\s'\u2019]*)(?:[eE]([+-]?\d{1,3}))?$/.exec(
    cleaned,
  );
  if (!match) return refuse(`“${text.trim()}” is not a number.`);
  const [, sign = '', written = '', exponent] = match;
  const body = dropSpaceGroups(written);
  if (body === null) return refuse(`The digits of “${text.trim()}” are not grouped in threes.`);
  const settled = settleSigns(body, decimalSign);
  // A point says nothing new: it is what makes '1,234' readable twice. Only a habit of commas settles it.
  const plain = settled === 'ambiguous' && usualSign === ',' ? settleSigns(body, ',') : settled;
  if (plain === 'ambiguous') {
    const [bare, pointed] = [body.replace(',', ''), body.replace(',', '.')];
    return refuse(
      `“${text.trim()}” could mean ${bare} or ${pointed}; write it one way or the other.`,
    );
  }
  if (plain === null) return refuse(`The decimal sign of “${text.trim()}” is not clear.`);
  const digits = (sign === '-' ? '-' : '') + plain;
  const value = Number(exponent === undefined ? digits : `${digits}e${exponent}`);
  if (!Number.isFinite(value)) return refuse(`“${text.trim()}” is too large.`);
  return {
    ok: true,
    value,
    canonical: exponent === undefined ? digits : `${digits}e${Number(exponent)}`,
  };
}

/** Removes spaces and apostrophes between groups of three; null when they stand elsewhere. */
function dropSpaceGroups(written: string): string | null {
  if (!/[\s'\u2019]/.test(written)) return written;
  const whole = /^\d{1,3}(?:([\s'\u2019])\d{3})(?:\1\d{3})*(?:[.,]\d+)?$/;
  return whole.test(written) ? written.replace(/[\s'\u2019]/g, '') : null;
}

/** The body with a point as its only sign, null when it cannot be read, 'ambiguous' when it can be read twice. */
function settleSigns(body: string, decimalSign?: '.' | ','): string | 'ambiguous' | null {
  const decimal = decimalSign ?? decimalSignOf(body);
  if (decimal === 'ambiguous' || decimal === null) return decimal;
  const group = decimal === '.' ? ',' : '.';
  const [whole = '', fraction, ...more] = decimal === 'none' ? [body] : body.split(decimal);
  if (more.length > 0 || (fraction !== undefined && !/^\d*$/.test(fraction))) return null;
  const separators = decimal === 'none' ? /[.,]/g : group === ',' ? /,/g : /\./g;
  const grouped =
    decimal === 'none'
      ? /^\d{1,3}(?:([.,])\d{3})(?:\1\d{3})*$/
      : group === ','
        ? /^\d{1,3}(,\d{3})*$/
        : /^\d{1,3}(\.\d{3})*$/;
  if (/[.,]/.test(whole) && !grouped.test(whole)) return null;
  const joined = whole.replace(separators, '');
  const digits = `${joined === '' ? '0' : joined}${fraction ? `.${fraction}` : ''}`;
  return /^\d+(\.\d+)?$/.test(digits) ? digits : null;
}

function decimalSignOf(body: string): '.' | ',' | 'none' | 'ambiguous' | null {
  const points = body.split('.').length - 1;
  const commas = body.split(',').length - 1;
  if (points === 0 && commas === 0) return 'none';
  if (points > 0 && commas > 0) return body.lastIndexOf('.') > body.lastIndexOf(',') ? '.' : ',';
  if (points > 1 || commas > 1) return 'none';
  if (points === 1) return '.';
  const [whole = '', fraction = ''] = body.split(',');
  const either = fraction.length === 3 && /^[1-9]\d{0,2}$/.test(whole);
  return either ? 'ambiguous' : ',';
}
