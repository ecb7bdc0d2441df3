import { UNIT_SPACE } from './number';

/** A number and its unit apart, so that a screen can draw the unit lighter. */
export interface Quantity {
  number: string;
  unit: string;
}

/** Number and unit in one text, kept together by a non-breaking space. */
export function quantityText({ number, unit }: Quantity): string {
  return unit === '' ? number : number + UNIT_SPACE + unit;
}
