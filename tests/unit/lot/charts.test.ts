import { describe, expect, test } from 'vitest';
import { float64sOf } from '@/api/analysis';
import { addressOf, pathOf } from '@/api/call';
import { limitStep, pixelAt, ppmAt, snapped } from '@/components/charts/limit-handle';
import { lossDrawing } from '@/components/charts/matched-filter-points';
import { powerText } from '@/components/charts/power-text';
import { timeScale } from '@/components/charts/time-scale';
import { criteriaDifference } from '@/components/lot/criteria-difference';
import { readAnalysis } from '@shared/contract/analysis';
import { tryLimits } from '@shared/analysis/what-if';
import { lotFixture, partCriteria, receiverCriteria } from '../../support/lot-fixture';

describe('a handle on the histogram’s axis', () => {
  const view = { lowPpm: -20, highPpm: 20, zoom: { start: 0, end: 100 }, widthPx: 408 };
  test('goes from ppm to pixels and back', () => {
    expect(pixelAt(view, 0)).toBe(204);
    for (const ppm of [-20, -7.3, 0, 12.5, 20])
      expect(ppmAt(view, pixelAt(view, ppm)!)).toBeCloseTo(ppm, 10);
  });
  test('follows the zoom and leaves the picture with its limit', () => {
    const zoomed = { ...view, zoom: { start: 50, end: 100 } };
    expect(pixelAt(zoomed, -10)).toBeNull();
    expect(pixelAt(zoomed, 10)).toBe(204);
  });
  test('moves in round steps', () => {
    expect(limitStep(view)).toBe(0.2);
    expect(snapped(10.0900001, 0.2)).toBe(10);
    expect(snapped(-3.3, 0.2)).toBe(-3.2);
  });
});

test('the loss of the matched filter is nought at no offset, even, and covers region and farthest unit', () => {
  const { points, reachPpm, symbolRateRegionPpm } = lossDrawing(receiverCriteria, 60);
  const middle = points[(points.length - 1) / 2]!;
  expect(middle.offsetPpm).toBeCloseTo(0, 9);
  expect(middle.correlationPeakDb).toBeCloseTo(0, 9);
  expect(points[0]!.correlationPeakDb).toBeCloseTo(points.at(-1)!.correlationPeakDb!, 9);
  expect(reachPpm).toBeGreaterThan(60);
  // 0.15 of 300 kHz at 868.3 MHz: 45 kHz / 868.3 MHz = 51.8254 ppm, by hand.
  expect(symbolRateRegionPpm).toBeCloseTo(51.8254, 3);
});

test('values of a logarithmic axis are written as powers of ten', () => {
  expect([1, 1000, 1e-9, 3e-9, 2e6].map(powerText)).toEqual([
    '1',
    '1,000',
    '10⁻⁹',
    '3·10⁻⁹',
    '2·10⁶',
  ]);
});

test('time is told in the unit that reads best', () => {
  expect([1, 90, 7200, 3600 * 24 * 30].map((s) => timeScale(s).name)).toEqual([
    'seconds',
    'seconds',
    'hours',
    'days',
  ]);
});

test('offsets travel as little-endian doubles and give the analysis’s own count again', () => {
  const { analysis, sortedPpm } = lotFixture();
  const wire = new DataView(new ArrayBuffer(8 * sortedPpm.length));
  sortedPpm.forEach((value, i) => wire.setFloat64(8 * i, value, true));
  const read = float64sOf(wire.buffer);
  expect([...read]).toEqual([...sortedPpm]);
  const tried = tryLimits(read, analysis.limits);
  expect(tried.count).toBe(analysis.beyond.limits.count);
  expect(tried.upperBound).toBeCloseTo(analysis.beyond.limits.upperBound, 12);
  expect(() => float64sOf(new ArrayBuffer(12))).toThrow(/incomplete/);
});

test('the path of an endpoint is filled in, and a missing part is an error rather than another address', () => {
  expect(pathOf(readAnalysis, { id: 'a b' })).toBe('/api/lots/a%20b/analysis');
  expect(addressOf(readAnalysis, { params: { id: '1' }, query: { analysisId: '2' } })).toBe(
    '/api/lots/1/analysis?analysisId=2',
  );
  expect(() => pathOf(readAnalysis)).toThrow(/id/);
});

test('two revisions are compared criterion by criterion', () => {
  expect(criteriaDifference(partCriteria, partCriteria)).toEqual([]);
  const wider = {
    ...partCriteria,
    toleranceHighPpm: 12,
    decisionRule: { kind: 'simple' as const },
  };
  expect(criteriaDifference(partCriteria, wider).map(({ field }) => field)).toEqual([
    'toleranceHighPpm',
    'decisionRule',
  ]);
});
