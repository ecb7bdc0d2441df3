import { describe, expect, test } from 'vitest';
import * as fc from 'fast-check';
import { bandStripCases } from '@/specimen/band-strip-cases';
import { bandStripGeometry } from '@shared/band-strip/geometry';
import { type BandStripGeometry, type BandStripInput } from '@shared/band-strip/types';

const places = [
  ['row', 300],
  ['row', 200],
  ['page', 1310],
  ['page', 358],
] as const;

function named(name: string): BandStripInput {
  return bandStripCases.find((one) => one.name === name)!.input;
}

function nearestPair({ marks }: BandStripGeometry): number {
  let nearest = Infinity;
  for (const [index, a] of marks.entries()) {
    for (const b of marks.slice(index + 1))
      nearest = Math.min(nearest, Math.hypot(a.x - b.x, a.y - b.y));
  }
  return nearest;
}

function drawnOrCounted({ marks, overflow }: BandStripGeometry): number {
  return marks.length + overflow.reduce((sum, { count }) => sum + count, 0);
}

describe.each(places)('on a %s strip %i px wide', (size, width) => {
  test.each(bandStripCases)(
    '$name: every unit beyond is one dot of its own or is counted',
    ({ input }) => {
      const geometry = bandStripGeometry(input, size, width);
      expect(drawnOrCounted(geometry)).toBe(input.beyondCount);
      expect(nearestPair(geometry)).toBeGreaterThan(2 * geometry.dotRadius);
    },
  );

  test.each(bandStripCases)('$name: everything lies inside the picture', ({ input }) => {
    const geometry = bandStripGeometry(input, size, width);
    const xs = [
      ...geometry.brackets.map(({ x }) => x),
      ...geometry.posts.map(({ x }) => x),
      ...geometry.bars.flatMap((bar) => [bar.x, bar.x + bar.width]),
      ...geometry.marks.flatMap(({ x }) => [x - geometry.dotRadius, x + geometry.dotRadius]),
      ...geometry.labels.map(({ x }) => x),
    ];
    expect(xs.every(Number.isFinite)).toBe(true);
    expect(Math.min(...xs)).toBeGreaterThanOrEqual(0);
    expect(Math.max(...xs)).toBeLessThanOrEqual(width);
    const ys = [
      ...geometry.bars.map(({ y }) => y),
      ...geometry.marks.map(({ y }) => y - geometry.dotRadius),
    ];
    expect(Math.min(0, ...ys)).toBeGreaterThanOrEqual(0);
  });

  test.each(bandStripCases)('$name: no dot crosses a limit or the allowance', ({ input }) => {
    const geometry = bandStripGeometry(input, size, width);
    for (const wall of [...geometry.posts, ...geometry.brackets]) {
      for (const mark of geometry.marks) {
        expect(Math.sign(mark.x - wall.x), `${mark.ppm} against ${wall.ppm}`).toBe(
          Math.sign(mark.ppm - wall.ppm),
        );
      }
    }
  });

  test('dots keep the order of their values', () => {
    const { marks } = bandStripGeometry(named('Many units just beyond one limit'), size, width);
    const byValue = [...marks].sort((a, b) => a.ppm - b.ppm || a.x - b.x);
    for (const [index, mark] of byValue.entries()) {
      if (index > 0) expect(mark.x).toBeGreaterThanOrEqual(byValue[index - 1]!.x - 1e-9);
    }
  });
});

test('any heap of units beyond keeps its dots apart and loses none', () => {
  const base = named('A lot within its limits');
  const beyond = fc.array(
    fc.oneof(
      fc.double({ min: 10.001, max: 400, noNaN: true }),
      fc.double({ min: -400, max: -10.001, noNaN: true }),
    ),
    { maxLength: 300 },
  );
  fc.assert(
    fc.property(
      beyond,
      fc.integer({ min: 180, max: 1400 }),
      fc.nat(2000),
      (beyondPpm, width, unlisted) => {
        const input = { ...base, beyondPpm, beyondCount: beyondPpm.length + unlisted };
        const geometry = bandStripGeometry(input, 'row', width);
        return (
          drawnOrCounted(geometry) === input.beyondCount &&
          nearestPair(geometry) > 2 * geometry.dotRadius
        );
      },
    ),
    { numRuns: 60 },
  );
});

test('far outliers go past a break instead of squeezing the lot', () => {
  const near = bandStripGeometry(named('A lot within its limits'), 'page', 1000);
  const far = bandStripGeometry(named('Two far outliers'), 'page', 1000);
  const span = ({ posts }: BandStripGeometry) => posts[1]!.x - posts[0]!.x;
  expect(far.breaks).toHaveLength(2);
  expect(far.marks.every(({ offScale }) => offScale)).toBe(true);
  expect(span(far)).toBeGreaterThan(0.75 * span(near));
});

test('an allowance narrower than the limits stands inside the posts', () => {
  const { brackets, posts } = bandStripGeometry(
    named('The receiver allows less than the limits'),
    'row',
    300,
  );
  expect(brackets[0]!.x).toBeGreaterThan(posts[0]!.x);
  expect(brackets[1]!.x).toBeLessThan(posts[1]!.x);
});

test('a one-sided limit has one post, one guard band and one bracket', () => {
  const { posts, guards, brackets } = bandStripGeometry(
    named('A limit on one side only'),
    'row',
    300,
  );
  expect([posts.length, guards.length, brackets.length]).toEqual([1, 1, 1]);
  expect(posts[0]!.side).toBe('high');
});

test('an empty lot shows its limits and allowance, no bar, no mean, no dot', () => {
  const geometry = bandStripGeometry(named('Nothing measured yet'), 'page', 800);
  expect(geometry.isEmpty).toBe(true);
  expect([geometry.bars.length, geometry.marks.length, geometry.meanX]).toEqual([0, 0, null]);
  expect([geometry.posts.length, geometry.brackets.length]).toEqual([2, 2]);
});

test('one unit is one visible bar under its mean', () => {
  const { bars, meanX } = bandStripGeometry(named('One unit'), 'row', 300);
  expect(bars).toHaveLength(1);
  expect(meanX).toBeGreaterThan(bars[0]!.x - 1);
  expect(meanX).toBeLessThan(bars[0]!.x + bars[0]!.width + 1);
});

test('a million units in 480 bins become bars wide enough to see, none lost', () => {
  const input = named('A million units');
  const { bars } = bandStripGeometry(input, 'row', 300);
  expect(bars.length).toBeLessThan(70);
  const inside = input.histogram.counts.reduce((sum, count, index) => {
    const isInside =
      input.histogram.edgesPpm[index + 1]! > -10 && input.histogram.edgesPpm[index]! < 10;
    return isInside ? sum + count : sum;
  }, 0);
  expect(bars.reduce((sum, { count }) => sum + count, 0)).toBe(inside);
});

test('the posts stand at the limits on the same scale as the mean', () => {
  const { posts, meanX, zeroX } = bandStripGeometry(named('A lot within its limits'), 'page', 1000);
  const perPpm = (posts[1]!.x - posts[0]!.x) / 20;
  expect(zeroX).toBeCloseTo((posts[0]!.x + posts[1]!.x) / 2, 6);
  expect(meanX! - zeroX!).toBeCloseTo(1.88 * perPpm, 6);
});

test('axis values never overlap', () => {
  for (const { input } of bandStripCases) {
    const xs = bandStripGeometry(input, 'page', 358)
      .labels.map(({ x }) => x)
      .sort((a, b) => a - b);
    for (const [index, x] of xs.entries())
      if (index > 0) expect(x - xs[index - 1]!).toBeGreaterThan(30);
  }
});
