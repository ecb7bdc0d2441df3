import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { paperTones } from '@shared/band-strip/svg';

const css = readFileSync(new URL('../../../src/styles/tokens.css', import.meta.url), 'utf8');

function block(selector: string): Record<string, string> {
  const start = css.indexOf(`${selector} {`);
  const body = css.slice(start, css.indexOf('}', start));
  return Object.fromEntries(
    [...body.matchAll(/--([\w-]+):\s*(#[0-9a-f]{6});/g)].map(([, name, value]) => [name, value]),
  );
}

const themes: Record<string, Record<string, string>> = {
  light: block(':root'),
  'dark by choice': block(":root[data-theme='dark']"),
  'dark by system': block(":root:not([data-theme='light'])"),
};

/** WCAG 2.2, relative luminance and contrast ratio. */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const channel = parseInt(hex.slice(at, at + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!;
}
function contrast(one: string, other: string): number {
  const [light, dark] = [luminance(one), luminance(other)].sort((a, b) => b - a);
  return (light! + 0.05) / (dark! + 0.05);
}

const grounds = ['paper', 'sheet', 'veil'];
const textPairs: [string, string][] = [
  ...grounds.flatMap((ground) =>
    ['ink', 'soft', 'amethyst', 'amethyst-deep', 'citrine', 'rose', 'prase'].map(
      (tone): [string, string] => [tone, ground],
    ),
  ),
  ['on-amethyst', 'amethyst'],
  ['on-amethyst', 'amethyst-deep'],
  ['on-amethyst', 'rose'],
  ['ink', 'trough'],
  ['soft', 'trough'],
  ['paper', 'ink'],
  ['rose', 'rose-veil'],
  ['ink', 'rose-veil'],
  ['citrine', 'citrine-veil'],
  ['ink', 'citrine-veil'],
  ['prase', 'prase-veil'],
  ['ink', 'prase-veil'],
];
const graphicPairs: [string, string][] = [
  ...['paper', 'sheet'].flatMap((ground) =>
    ['bars', 'hatch', 'edge', 'amethyst', 'rose', 'ink', 'citrine', 'prase'].map(
      (tone): [string, string] => [tone, ground],
    ),
  ),
  ['edge', 'veil'],
  ['ink', 'trough'],
];

test('the checker agrees with the black-on-white ratio of WCAG 2.2', () => {
  expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10);
  expect(contrast('#777777', '#ffffff')).toBeCloseTo(4.48, 2);
});

describe.each(Object.entries(themes))('%s', (_, palette) => {
  test.each(textPairs)('%s on %s reads as text (4.5 : 1)', (tone, ground) => {
    expect(contrast(palette[tone]!, palette[ground]!)).toBeGreaterThanOrEqual(4.5);
  });
  test.each(graphicPairs)('%s on %s reads as a mark (3 : 1)', (tone, ground) => {
    expect(contrast(palette[tone]!, palette[ground]!)).toBeGreaterThanOrEqual(3);
  });
});

test('dark by system and dark by choice are one palette', () => {
  expect(themes['dark by system']).toEqual(themes['dark by choice']);
  expect(Object.keys(themes['dark by choice']!)).toEqual(Object.keys(themes.light!));
});

test('mails and reports draw the band strip in the light palette', () => {
  const { ink, soft, bars, hatch, amethyst, rose, edge } = themes.light!;
  expect(paperTones).toEqual({
    ink,
    soft,
    bars,
    hatch,
    axis: edge,
    allowance: amethyst,
    beyond: rose,
  });
});
