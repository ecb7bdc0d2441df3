/** Most digits before and after the decimal sign; more is no measurement. */
export const mostWholeDigits = 20;
export const mostDecimals = 30;

const ZERO = 48;
const POINT = 46;

/**
 * Writes the plain decimal in bytes[start, end) (sign, digits, one point; no spaces, no exponent) as the binary form of
 * a PostgreSQL numeric, every written decimal kept, and answers the offset after it; -1 when it is not plain.
 * Layout: int16 groups of four digits, weight of the first group, sign, decimals; then the groups. It is the form
 * PostgreSQL itself sends: no leading and no trailing zero groups.
 */
export function writeNumeric(
  out: Buffer,
  at: number,
  bytes: Buffer,
  start: number,
  end: number,
): number {
  let p = start;
  let negative = false;
  const first = bytes[p];
  if (first === 45 || first === 43) {
    negative = first === 45;
    p += 1;
  }
  const wholeStart = p;
  while (p < end) {
    const digit = bytes[p]! - ZERO;
    if (digit < 0 || digit > 9) break;
    p += 1;
  }
  const wholeEnd = p;
  let fractionStart = p;
  if (p < end) {
    if (bytes[p] !== POINT) return -1;
    fractionStart = p + 1;
    for (p += 1; p < end; p += 1) {
      const digit = bytes[p]! - ZERO;
      if (digit < 0 || digit > 9) return -1;
    }
  }
  const decimals = end - fractionStart;
  if (wholeEnd - wholeStart + decimals === 0) return -1;
  if (decimals > mostDecimals || wholeEnd - wholeStart > mostWholeDigits) return -1;

  let whole = wholeStart;
  while (whole < wholeEnd && bytes[whole] === ZERO) whole += 1;
  const wholeDigits = wholeEnd - whole;
  const wholeGroups = (wholeDigits + 3) >> 2;
  const fractionGroups = (decimals + 3) >> 2;
  let weight = wholeGroups - 1;
  let write = at + 8;
  let groups = 0;
  let significant = 0;

  let taken = wholeDigits - (wholeGroups - 1) * 4;
  let read = whole;
  for (let g = 0; g < wholeGroups; g += 1) {
    let value = 0;
    for (let d = 0; d < taken; d += 1) value = value * 10 + (bytes[read++]! - ZERO);
    taken = 4;
    out[write++] = value >> 8;
    out[write++] = value & 255;
    groups += 1;
    if (value !== 0) significant = groups;
  }
  read = fractionStart;
  for (let g = 0; g < fractionGroups; g += 1) {
    let value = 0;
    for (let d = 0; d < 4; d += 1) value = value * 10 + (read < end ? bytes[read++]! - ZERO : 0);
    if (groups === 0 && value === 0) {
      weight -= 1;
      continue;
    }
    out[write++] = value >> 8;
    out[write++] = value & 255;
    groups += 1;
    if (value !== 0) significant = groups;
  }
  if (significant === 0) {
    weight = 0;
    negative = false;
  }
  out.writeInt16BE(significant, at);
  out.writeInt16BE(weight, at + 2);
  out.writeInt16BE(negative ? 0x4000 : 0, at + 4);
  out.writeInt16BE(decimals, at + 6);
  return at + 8 + 2 * significant;
}
