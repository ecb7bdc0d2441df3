import { formatNumber, groupThousands } from './number';
import { countOf } from './counts';
import { type Quantity, quantityText } from './quantity';

const MINUTE = 60;
const HOUR = 3600;
const DAY = 86_400;

/** A length of time in the one or two units that matter: '0.8 s', '3 min 20 s', '2 h 5 min', '3 days'. */
export function duration(seconds: number | null | undefined): string {
  if (seconds === null || seconds === undefined || !Number.isFinite(seconds) || seconds < 0)
    return '–';
  if (seconds < 1e-3) return quantityText(scaled(seconds, 1e-6, 'µs'));
  if (seconds < 0.0995) return quantityText(scaled(seconds, 1e-3, 'ms'));
  if (seconds < 59.95)
    return quantityText({
      number: formatNumber(seconds, { significant: seconds < 10 ? 2 : 3 }),
      unit: 's',
    });
  const whole = Math.round(seconds);
  if (whole < HOUR) return twoUnits(whole, MINUTE, 'min', 1, 's');
  if (whole < DAY) return twoUnits(Math.round(whole / MINUTE) * MINUTE, HOUR, 'h', MINUTE, 'min');
  return countOf(Math.round(whole / DAY), 'day');
}

/** How long ago or ahead, roughly, for lists: '5 minutes', '3 days', '2 months', '1 year'. */
export function roughDuration(seconds: number): string {
  const span = Math.abs(seconds);
  if (span < MINUTE) return 'less than a minute';
  if (span < HOUR) return countOf(Math.round(span / MINUTE), 'minute');
  if (span < DAY) return countOf(Math.round(span / HOUR), 'hour');
  if (span < 60 * DAY) return countOf(Math.round(span / DAY), 'day');
  if (span < 730 * DAY) return countOf(Math.round(span / (30.44 * DAY)), 'month');
  return countOf(Math.round(span / (365.25 * DAY)), 'year');
}

/** How long something has waited, for a narrow column: '2 min', '5 h', '4 d'. */
export function waitingParts(seconds: number): Quantity {
  const span = Math.max(0, seconds);
  if (span < HOUR) return { number: String(Math.max(1, Math.floor(span / MINUTE))), unit: 'min' };
  if (span < DAY) return { number: String(Math.floor(span / HOUR)), unit: 'h' };
  return { number: groupThousands(String(Math.floor(span / DAY))), unit: 'd' };
}

function scaled(seconds: number, step: number, unit: string): Quantity {
  return { number: formatNumber(seconds / step, { significant: 2 }), unit };
}

function twoUnits(
  seconds: number,
  large: number,
  largeUnit: string,
  small: number,
  smallUnit: string,
): string {
  const rest = Math.round((seconds % large) / small);
  const first = quantityText({ number: String(Math.floor(seconds / large)), unit: largeUnit });
  if (rest === 0) return first;
  return `${first} ${quantityText({ number: String(rest), unit: smallUnit })}`;
}
