import { parseNumber } from '@shared/format/parse-number';
import { formatDecimal, parseDecimal } from '@shared/radio/decimal';
import { mostDecimals, mostWholeDigits } from './decimal-bytes';

export type PlainNumber = { ok: true; plain: string } | { ok: false; rule: string; reason: string };

const refuse = (rule: string, reason: string): PlainNumber => ({ ok: false, rule, reason });

/**
 * The plain decimal text of a number as files write it: with the file's decimal sign, grouped in threes, with an
 * exponent, with a true minus. Every written digit is kept. What could mean two numbers is refused.
 */
export function plainNumber(text: string, decimalSign: '.' | ','): PlainNumber {
  const shown = text.length > 40 ? `${text.slice(0, 40)}…` : text;
  if (/^[+-]?(nan|inf(inity)?)$/i.test(text))
    return refuse('number.not_finite', `“${shown}” is no measured value.`);
  if (text.length > 80) return refuse('number.too_long', `“${shown}” has too many digits.`);
  const other = decimalSign === '.' ? ',' : '.';
  if (!text.includes(decimalSign) && new RegExp(`^[^${other}]*\\${other}\\d{3}$`).test(text))
    return refuse(
      'number.ambiguous',
      `“${shown}” could mean two numbers; the file's decimal sign is “${decimalSign}”.`,
    );
  const exponent = /[eE][+-]?(\d+)$/.exec(text);
  if (exponent && Number(exponent[1]) > 60)
    return refuse('number.out_of_range', `“${shown}” is far outside what can be measured.`);
  const parsed = parseNumber(text, { decimalSign });
  if (!parsed.ok) return refuse('number.unreadable', `“${shown}” is not a number.`);
  const exponentAt = parsed.canonical.indexOf('e');
  try {
    const plain =
      exponentAt === -1 ? parsed.canonical : formatDecimal(parseDecimal(parsed.canonical));
    const [whole = '', fraction = ''] = plain.replace(/^[+-]/, '').split('.');
    if (whole.replace(/^0+/, '').length > mostWholeDigits || fraction.length > mostDecimals)
      return refuse('number.too_long', `“${shown}” has more digits than a measurement can have.`);
    return { ok: true, plain };
  } catch {
    return refuse('number.out_of_range', `“${shown}” is far outside what can be measured.`);
  }
}
