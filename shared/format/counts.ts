import { groupThousands, MINUS } from './number';
import { type Quantity, quantityText } from './quantity';

/** A whole number: '3,000'. */
export function count(value: number | null | undefined): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return '–';
  const rounded = Math.round(value);
  return (rounded < 0 ? MINUS : '') + groupThousands(String(Math.abs(rounded)));
}

/** Counted things, with the word in its right number: '1 unit', '3,000 units'. */
export function countOf(value: number, one: string, many = `${one}s`): string {
  return quantityText(countOfParts(value, one, many));
}

export function countOfParts(value: number, one: string, many = `${one}s`): Quantity {
  return { number: count(value), unit: Math.round(value) === 1 ? one : many };
}

const WORDS = [
  'no',
  'one',
  'two',
  'three',
  'four',
  'five',
  'six',
  'seven',
  'eight',
  'nine',
  'ten',
  'eleven',
  'twelve',
];

/** A small count inside a sentence, spelled to twelve: 'three units', '40 units'. */
export function spelledCount(value: number, one: string, many = `${one}s`): string {
  const word = WORDS[value];
  if (word === undefined) return countOf(value, one, many);
  return `${word} ${value === 1 ? one : many}`;
}

/** The first letter made a capital, for a count that opens a sentence. */
export function opening(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** 'a', 'a and b', 'a, b and c'. */
export function listOf(items: readonly string[], joint = 'and'): string {
  if (items.length < 2) return items[0] ?? '';
  return `${items.slice(0, -1).join(', ')} ${joint} ${items[items.length - 1]}`;
}
