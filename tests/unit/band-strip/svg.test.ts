// @vitest-environment jsdom
import { expect, test } from 'vitest';
import { bandStripCases } from '@/specimen/band-strip-cases';
import { bandStripSentence } from '@shared/band-strip/sentence';
import { bandStripSvg } from '@shared/band-strip/svg';

const input = (name: string) => bandStripCases.find((one) => one.name === name)!.input;
const spoken = (name: string) => bandStripSentence(input(name)).replaceAll('\u00a0', ' ');

test('the picture in words names units, mean, spread and what lies beyond which limit', () => {
  expect(spoken('A lot within its limits')).toBe(
    '200 units, mean +1.9 ppm, spread 2.4 ppm, none beyond ±10 ppm',
  );
  expect(spoken('Three units beyond')).toBe(
    '200 units, mean +1.9 ppm, spread 2.4 ppm, 1 beyond −10 ppm, 2 beyond +10 ppm',
  );
  expect(spoken('Nothing measured yet')).toBe('No units measured yet.');
  expect(spoken('One unit')).toBe('1 unit at +3.2 ppm, none beyond ±10 ppm');
  expect(spoken('A limit on one side only')).toContain('1 beyond +10 ppm');
  expect(spoken('More beyond than can be drawn')).toContain('1,384 beyond ±10 ppm');
});

test.each(bandStripCases)(
  '$name: the text form is one well-formed SVG with its sentence as title',
  ({ input: lot }) => {
    const text = bandStripSvg(lot, { width: 600 });
    const parsed = new DOMParser().parseFromString(text, 'image/svg+xml');
    expect(parsed.querySelector('parsererror')).toBeNull();
    expect(parsed.querySelector('title')?.textContent).toBe(bandStripSentence(lot));
    expect(parsed.querySelectorAll('circle')).toHaveLength(lot.beyondCount - overflowIn(parsed));
    expect(text).not.toMatch(/NaN|Infinity|undefined/);
  },
);

function overflowIn(parsed: Document): number {
  return [...parsed.querySelectorAll('text')]
    .filter((node) => node.getAttribute('fill') === '#a3304f')
    .reduce((sum, node) => sum + Number(node.textContent!.replace(/[+,]/g, '')), 0);
}
