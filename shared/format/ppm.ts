import { formatNumber, type NumberOptions } from './number';
import { type Quantity, quantityText } from './quantity';

/** An offset or tolerance in parts per million; three significant digits unless told otherwise. */
export function ppmParts(valuePpm: number | null | undefined, options?: NumberOptions): Quantity {
  return { number: formatNumber(valuePpm, options), unit: 'ppm' };
}

export function ppm(valuePpm: number | null | undefined, options?: NumberOptions): string {
  return quantityText(ppmParts(valuePpm, options));
}

export interface LimitsPpm {
  /** Null: no limit on that side. */
  lowPpm: number | null;
  highPpm: number | null;
}

/** Limits as the trade writes them: '±10 ppm', '−5 to +10 ppm', 'up to +10 ppm', 'from −10 ppm'. */
export function limitsParts({ lowPpm, highPpm }: LimitsPpm, options: NumberOptions = {}): Quantity {
  const show = (value: number) =>
    formatNumber(value, { significant: 6, sign: 'always', ...options });
  if (lowPpm !== null && highPpm !== null) {
    const symmetric = lowPpm === -highPpm && highPpm > 0;
    const number = symmetric ? `±${show(highPpm).slice(1)}` : `${show(lowPpm)} to ${show(highPpm)}`;
    return { number, unit: 'ppm' };
  }
  if (highPpm !== null) return { number: `up to ${show(highPpm)}`, unit: 'ppm' };
  if (lowPpm !== null) return { number: `from ${show(lowPpm)}`, unit: 'ppm' };
  return { number: 'no limits', unit: '' };
}

export function limitsPpm(limits: LimitsPpm, options?: NumberOptions): string {
  return quantityText(limitsParts(limits, options));
}

/** What a unit is when it is out: 'beyond ±10 ppm', 'above +10 ppm', 'below −10 ppm'. */
export function beyondLimits(limits: LimitsPpm): string {
  const { lowPpm, highPpm } = limits;
  const show = (value: number) => ppm(value, { significant: 6, sign: 'always' });
  if (lowPpm === null && highPpm !== null) return `above ${show(highPpm)}`;
  if (highPpm === null && lowPpm !== null) return `below ${show(lowPpm)}`;
  const text = limitsPpm(limits);
  return text.startsWith('±') ? `beyond ${text}` : `outside ${text}`;
}
