/** Microseconds since 2000-01-01T00:00:00Z, PostgreSQL's own count; NaN when the text is no instant. */
export type Microseconds = number;

const DAY = 86_400_000_000;

/** Days from 2000-01-01 to a day of the Gregorian calendar; NaN when there is no such day. */
function daysFrom2000(year: number, month: number, day: number): number {
  if (month < 1 || month > 12 || day < 1 || day > 31) return NaN;
  const ms = Date.UTC(year, month - 1, day);
  const date = new Date(ms);
  if (date.getUTCMonth() !== month - 1 || date.getUTCDate() !== day) return NaN;
  return ms / 86_400_000 - 10957;
}

/**
 * Reads ISO 8601 instants: `2026-11-30T12:05:09.123456Z`, a space instead of T, seconds or fraction left out, `Z`, an
 * offset such as `+02:00` or `+0200`, or none, which counts as UTC. A date alone is its first moment.
 * A fraction finer than a microsecond is rounded. The day is remembered, because readings of one day come together.
 */
export class InstantReader {
  private dayKey = -1;
  private dayValue = 0;

  read(bytes: Buffer, start: number, end: number): Microseconds {
    const length = end - start;
    if (length < 10 || length > 40) return NaN;
    const year = four(bytes, start);
    const month = two(bytes, start + 5);
    const day = two(bytes, start + 8);
    if (bytes[start + 4] !== 45 || bytes[start + 7] !== 45) return NaN;
    const key = year * 10_000 + month * 100 + day;
    if (!(key >= 0) || year < 1900) return NaN;
    if (key !== this.dayKey) {
      this.dayValue = daysFrom2000(year, month, day) * DAY;
      this.dayKey = key;
    }
    if (length === 10) return this.dayValue;
    const mark = bytes[start + 10];
    if ((mark !== 84 && mark !== 32 && mark !== 116) || length < 16 || bytes[start + 13] !== 58)
      return NaN;
    const hour = two(bytes, start + 11);
    const minute = two(bytes, start + 14);
    let p = start + 16;
    let second = 0;
    let micro = 0;
    if (p < end && bytes[p] === 58) {
      if (p + 3 > end) return NaN;
      second = two(bytes, p + 1);
      p += 3;
      if (p < end && (bytes[p] === 46 || bytes[p] === 44)) {
        p += 1;
        let scale = 100_000;
        const from = p;
        for (; p < end; p += 1) {
          const digit = bytes[p]! - 48;
          if (digit < 0 || digit > 9) break;
          micro += digit * scale;
          scale /= 10;
        }
        if (p === from) return NaN;
        micro = Math.round(micro);
      }
    }
    if (!(hour <= 23) || !(minute <= 59) || !(second <= 59)) return NaN;
    const zone = zoneMinutes(bytes, p, end);
    return this.dayValue + ((hour * 60 + minute - zone) * 60 + second) * 1_000_000 + micro;
  }
}

function zoneMinutes(bytes: Buffer, p: number, end: number): number {
  if (p === end) return 0;
  const sign = bytes[p];
  if (sign === 90 || sign === 122) return p + 1 === end ? 0 : NaN;
  if (sign !== 43 && sign !== 45) return NaN;
  const hours = two(bytes, p + 1);
  const rest = end - p;
  const minutes =
    rest === 3
      ? 0
      : rest === 5
        ? two(bytes, p + 3)
        : rest === 6 && bytes[p + 3] === 58
          ? two(bytes, p + 4)
          : NaN;
  if (!(hours <= 15) || !(minutes <= 59)) return NaN;
  return (sign === 45 ? -1 : 1) * (hours * 60 + minutes);
}

function two(bytes: Buffer, at: number): number {
  const tens = bytes[at]! - 48;
  const ones = bytes[at + 1]! - 48;
  return tens >= 0 && tens <= 9 && ones >= 0 && ones <= 9 ? tens * 10 + ones : NaN;
}

function four(bytes: Buffer, at: number): number {
  return two(bytes, at) * 100 + two(bytes, at + 2);
}
