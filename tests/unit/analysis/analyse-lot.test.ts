import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { analyseLot, canAnalyse } from '@shared/analysis/analyse-lot';
import { type AnalysisCriteria } from '@shared/analysis/criteria';
import { UnitCollector } from '@shared/analysis/units';
import { AnalysisResult } from '@shared/contract/analysis';
import { type PartCriteria } from '@shared/contract/parts';
import { criteriaOf, offsetsOf } from '../../support/lot-fixture';

const whole = criteriaOf(3000);
const uploadId = '7d1f0a52-3c1e-4b8a-9a61-0f5f5c6f2d11';

function criteriaWith(
  changes: Partial<AnalysisCriteria> = {},
  part: Partial<PartCriteria> = {},
): AnalysisCriteria {
  return {
    ...whole,
    part: { ...whole.part, criteria: { ...whole.part.criteria, ...part } },
    ...changes,
  };
}

function analysed(offsets: readonly number[], criteria = criteriaWith()) {
  const collector = new UnitCollector(25);
  offsets.forEach((offsetPpm, i) => collector.addSingle(offsetPpm, 1, i + 2));
  return analyseLot({
    units: collector.finish(),
    criteria,
    refusedRows: 0,
    identify: ({ fileLine }) => ({ serial: `A${fileLine}`, uploadId }),
  }).result;
}

const twoReceivers = whole.receivers;
/** Every receiver with so wide a far end that nothing is left for the unit. */
const usedUp = twoReceivers.map((receiver) => ({
  ...receiver,
  criteria: { ...receiver.criteria, farEndTolerancePpm: 500 },
}));

describe('a lot analysed', () => {
  it('meets the contract, whatever is missing', () => {
    const lots: [string, AnalysisResult][] = [
      ['as it comes', analysed(offsetsOf({}))],
      ['no bench', analysed(offsetsOf({}), criteriaWith({ bench: null }))],
      ['no receiver', analysed(offsetsOf({}), criteriaWith({ receivers: [] }))],
      ['allowance used up', analysed(offsetsOf({}), criteriaWith({ receivers: usedUp }))],
      ['one unit', analysed([3])],
      ['two units', analysed([3, 4])],
      ['no spread', analysed(Array.from({ length: 40 }, () => 2.5))],
      ['all beyond', analysed(Array.from({ length: 40 }, (_, i) => 20 + i / 10))],
      ['one limit', analysed(offsetsOf({}), criteriaWith({}, { toleranceLowPpm: null }))],
      ['one unit a lot', analysed([3], criteriaWith({ lotSize: 1 }))],
      ['more units than the lot', analysed(offsetsOf({}), criteriaWith({ lotSize: 20 }))],
      ['discontinued', analysed(offsetsOf({}), criteriaWith({ severity: 'discontinued' }))],
      ['reduced', analysed(offsetsOf({}), criteriaWith({ severity: 'reduced' }))],
    ];
    for (const [name, result] of lots) {
      const parsed = AnalysisResult.safeParse(result);
      expect(parsed.error?.issues ?? [], name).toEqual([]);
      expect(JSON.parse(JSON.stringify(result)), name).toEqual(result);
    }
  });

  it.each([
    { kind: 'variables', level: 'II', aqlPercent: 1 },
    { kind: 'zeroAcceptance', limitingQualityPercent: 1, consumersRisk: 0.1 },
    { kind: 'everyUnit', allowedNonconforming: 0 },
  ] as const)('answers for a $kind plan, from one unit on', (samplingRule) => {
    for (const offsets of [[3], offsetsOf({ units: 300 })])
      expect(
        AnalysisResult.safeParse(analysed(offsets, criteriaWith({ samplingRule }))).error,
      ).toBeUndefined();
  });

  it('takes a unit on a limit as conforming, everywhere alike', () => {
    const body = offsetsOf({ units: 197, meanPpm: 0, beyondPpm: [] });
    // The third is what a division may leave of exactly ten.
    const result = analysed(
      [...body, 10, -10, 10 + 2e-15],
      criteriaWith({ bench: null }, { decisionRule: { kind: 'simple' } }),
    );
    expect(result.beyond.limits.count).toBe(0);
    expect(result.guardBand).toMatchObject({ conforming: 200, notProven: 0, nonconforming: 0 });
    expect(result.unitsBeyond.filter(({ beyond }) => beyond !== 'allowance')).toEqual([]);
    const { edgesPpm, counts } = result.histogram;
    const inside = counts.filter((_, i) => edgesPpm[i]! >= -10 && edgesPpm[i + 1]! <= 10);
    expect(inside.reduce((sum, count) => sum + count, 0)).toBe(200);
  });

  it('keeps the sign and names the units that are beyond, the farthest first', () => {
    const result = analysed([...offsetsOf({ beyondPpm: [] }), -12.5, 11.5]);
    expect(result.unitsBeyond.slice(0, 2)).toMatchObject([
      { serial: 'A202', fileLine: 202, offsetPpm: -12.5, uploadId },
      { serial: 'A203', fileLine: 203, offsetPpm: 11.5 },
    ]);
    expect(result.offset.minPpm).toBe(-12.5);
    expect(result.offset.maxPpm).toBe(11.5);
    expect(result.bandStrip.beyondPpm).toEqual([-12.5, 11.5]);
  });

  it('mirrors with the lot', () => {
    const offsets = offsetsOf({ beyondPpm: [-12.9, 11, 11.6] });
    const up = analysed(offsets);
    const down = analysed(offsets.map((ppm) => -ppm));
    expect(down.offset.meanPpm).toBeCloseTo(-up.offset.meanPpm, 12);
    expect(down.offset.minPpm).toBe(-up.offset.maxPpm);
    expect(down.shape.skewness!).toBeCloseTo(-up.shape.skewness!, 10);
    expect(down.beyond.limits).toEqual(up.beyond.limits);
    expect(down.tolerance!.lowPpm).toBeCloseTo(-up.tolerance!.highPpm, 10);
    expect(down.guardBand.nonconforming).toBe(up.guardBand.nonconforming);
    up.links.forEach((link, i) =>
      expect(down.links[i]!.beyondSymbolRate.share).toBeCloseTo(link.beyondSymbolRate.share, 12),
    );
    expect(down.finding.decision).toBe(up.finding.decision);
  });

  it('does not depend on the order of arrival', () => {
    const offsets = offsetsOf({ units: 60 });
    const expected = analysed(offsets);
    fc.assert(
      fc.property(fc.shuffledSubarray(offsets, { minLength: 60 }), (shuffled) => {
        const result = analysed(shuffled);
        expect(result.offset.meanPpm).toBeCloseTo(expected.offset.meanPpm, 12);
        expect(result.beyond).toEqual(expected.beyond);
        expect(result.histogram).toEqual(expected.histogram);
        expect(result.finding.decision).toBe(expected.finding.decision);
      }),
      { numRuns: 10 },
    );
  });

  it('judges by the strictest of two receivers, and names it', () => {
    const result = analysed(offsetsOf({}));
    const [first, second] = result.links;
    expect(first!.strictest).toBe(true);
    expect(first!.allowance.forUnitPpm).toBeLessThan(second!.allowance.forUnitPpm);
    expect(result.allowance).toEqual({
      lowPpm: -first!.allowance.forUnitPpm,
      highPpm: first!.allowance.forUnitPpm,
      receiverName: first!.receiverName,
    });
    expect(result.bandStrip.allowanceHighPpm).toBe(first!.allowance.forUnitPpm);
  });

  it('leaves no width, and every unit beyond, when the allowance is used up', () => {
    const result = analysed([0, ...offsetsOf({ units: 99 })], criteriaWith({ receivers: usedUp }));
    expect(result.allowance).toMatchObject({ lowPpm: 0, highPpm: 0 });
    expect(result.beyond.allowance!.count).toBe(99);
    expect(result.finding.decision).not.toBe('accept');
  });

  it('has nothing to say of an allowance without a receiver, nor of risk without a bench', () => {
    const alone = analysed(offsetsOf({}), criteriaWith({ receivers: [] }));
    expect(alone).toMatchObject({ allowance: null, links: [], budget: null });
    expect(alone.beyond.allowance).toBeNull();
    const unknown = analysed(offsetsOf({}), criteriaWith({ bench: null }));
    expect(unknown.risk).toEqual({ consumersGlobal: null, producersGlobal: null });
    expect(unknown.uncertaintyOfMeanPpm).toBeNull();
    expect(unknown.guardBand.text).toContain('no uncertainty is known');
  });

  it('tests the body for normality without its strays', () => {
    const result = analysed([...offsetsOf({ units: 400, beyondPpm: [] }), 60, 61, -60]);
    expect(result.outliers.count).toBe(3);
    expect([...result.outliers.valuesPpm].sort((a, b) => a - b)).toEqual([-60, 60, 61]);
    expect(result.shape.andersonDarling!.p).toBeLessThan(0.001);
    expect(result.finding.reasons.map(({ text }) => text).join(' ')).not.toContain('not normal');
  });

  it('draws both tails of the normal plot whole, and its points in order', () => {
    const offsets = offsetsOf({ units: 5000, beyondPpm: [-30, 30] });
    const { probabilityPlot } = analysed(offsets);
    const sorted = [...offsets].sort((a, b) => a - b);
    expect(probabilityPlot.slice(0, 64).map(([, ppm]) => ppm)).toEqual(sorted.slice(0, 64));
    expect(probabilityPlot.slice(-64).map(([, ppm]) => ppm)).toEqual(sorted.slice(-64));
    expect(probabilityPlot.length).toBeLessThanOrEqual(513);
    const scores = probabilityPlot.map(([score]) => score);
    expect(scores).toEqual([...scores].sort((a, b) => a - b));
  });

  it('needs one unit with an offset', () => {
    expect(canAnalyse(new UnitCollector(25).finish())).toBe(false);
  });
});
