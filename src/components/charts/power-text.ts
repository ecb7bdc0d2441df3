import { formatNumber, MINUS } from '@shared/format/number';

const raised: Record<string, string> = {
  '-': '⁻',
  '0': '⁰',
  '1': '¹',
  '2': '²',
  '3': '³',
  '4': '⁴',
  '5': '⁵',
  '6': '⁶',
  '7': '⁷',
  '8': '⁸',
  '9': '⁹',
};

/** A value of a logarithmic axis: plain between 0.01 and 10,000, else as a power of ten, '3·10⁻⁹'. */
export function powerText(value: number): string {
  const magnitude = Math.abs(value);
  if (value === 0 || (magnitude >= 0.01 && magnitude < 1e5)) return formatNumber(value);
  const [mantissa = '', exponent = '0'] = magnitude.toExponential(2).split('e');
  const power = `10${[...String(Number(exponent))].map((sign) => raised[sign] ?? sign).join('')}`;
  const factor = Number(mantissa);
  return (value < 0 ? MINUS : '') + (factor === 1 ? power : `${factor}·${power}`);
}
