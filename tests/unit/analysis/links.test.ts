import { describe, expect, it } from 'vitest';
import { judgeLinks, partBudget } from '@shared/analysis/links';
import { type JudgingReceiver } from '@shared/analysis/criteria';
import { type ReceiverCriteria } from '@shared/contract/receivers';
import { partCriteria, receiverCriteria } from '../../support/lot-fixture';

/** No drift, no Doppler: only the far end and the unit. */
const bare = {
  ...partCriteria,
  stabilityPpm: null,
  ageingFirstYearPpm: null,
  ageingTenYearsPpm: null,
  supplyPpm: 0,
  loadPpm: 0,
};
const receiver = (name: string, changes: Partial<ReceiverCriteria> = {}): JudgingReceiver => ({
  receiverId: name,
  revisionId: `${name}-B`,
  name,
  revision: 'B',
  criteria: { ...receiverCriteria, greatestSpeedMps: 0, ...changes },
});
const judge = (offsets: number[], wholeLot = true, ...receivers: JudgingReceiver[]) =>
  judgeLinks(Float64Array.from(offsets).sort(), bare, receivers, wholeLot);

/** 1 GHz carrier, so that 1 ppm is 1 kHz; symbol-rate region 15 kHz = 15 ppm; far end +/-10 ppm. */
const round: Partial<ReceiverCriteria> = {
  carrierHz: '1000000000',
  symbolRateHz: '100000',
  shareOfSymbolRate: 0.15,
  frontEndBandwidthHz: '300000',
  rollOff: 0,
  farEndTolerancePpm: 10,
};

describe('links of a lot with a receiver', () => {
  it('takes the share of far ends that a unit cannot reach', () => {
    // A unit at +9 leaves the region of 15 ppm with far ends below -6: 4 of 20 ppm.
    const [links] = judge([9], true, receiver('Gate', round));
    expect(links!.allowance.totalHz).toBeCloseTo(15_000, 6);
    expect(links!.allowance.totalPpm).toBeCloseTo(15, 9);
    expect(links!.allowance.forUnitPpm).toBeCloseTo(5, 9);
    expect(links!.beyondSymbolRate.share).toBeCloseTo(0.2, 12);
    expect(links!.symbolRate.share).toBeCloseTo(0.8, 12);
    // Every unit was measured: nothing is inferred.
    expect(links!.beyondSymbolRate.upperBound).toBeCloseTo(0.2, 12);
    expect(judge([-9], true, receiver('Gate', round))[0]!.beyondSymbolRate.share).toBeCloseTo(
      0.2,
      12,
    );
  });

  it('lets a unit on the allowance through with every far end', () => {
    expect(judge([5, -5], true, receiver('Gate', round))[0]!.beyondSymbolRate.share).toBe(0);
    expect(
      judge([5, -5.5], true, receiver('Gate', round))[0]!.beyondSymbolRate.share,
    ).toBeGreaterThan(0);
  });

  it('bounds the share from above when only a sample was measured', () => {
    const [links] = judge([1, 2, 3], false, receiver('Gate', round));
    expect(links!.beyondSymbolRate.share).toBe(0);
    expect(links!.beyondSymbolRate.upperBound).toBeGreaterThan(0.5);
    expect(links!.withinAllowed).toBe(false);
    expect(judge([1, 2, 3], true, receiver('Gate', round))[0]!.withinAllowed).toBe(true);
  });

  it('names the strictest of several receivers first, whatever their order', () => {
    const strict = receiver('Meter', { ...round, shareOfSymbolRate: 0.12 });
    const lax = receiver('Gate', round);
    for (const order of [
      [lax, strict],
      [strict, lax],
    ]) {
      const links = judge([1], true, ...order);
      expect(links.map(({ receiverName }) => receiverName)).toEqual(['Meter', 'Gate']);
      expect(links.map(({ strictest }) => strictest)).toEqual([true, false]);
      expect(links[0]!.receiverRevisionId).toBe('Meter-B');
    }
  });

  it('goes below zero when far end, drift and motion leave nothing', () => {
    const [links] = judge([0], true, receiver('Gate', { ...round, farEndTolerancePpm: 20 }));
    expect(links!.allowance.forUnitPpm).toBeCloseTo(-5, 9);
    expect(links!.beyondSymbolRate.share).toBeCloseTo(0.25, 12);
    expect(links!.withinAllowed).toBe(false);
  });

  it('knows a perfect and a normal far end', () => {
    const perfect = receiver('Gate', { ...round, farEndTolerancePpm: 0 });
    expect(judge([14.9, 15.1], true, perfect)[0]!.beyondSymbolRate.share).toBe(0.5);
    const normal = receiver('Gate', { ...round, farEndTolerancePpm: 9, farEndModel: 'normal' });
    // Three standard deviations are the tolerance: 15 - 12 = 3 ppm is one of them; P(Z > 1), both limits.
    expect(judge([12], true, normal)[0]!.beyondSymbolRate.share).toBeCloseTo(0.158655253931457, 9);
  });

  it('has none without a receiver', () => {
    expect(judge([1, 2], true)).toEqual([]);
  });
});

describe('budget by data sheet', () => {
  it('adds up to the worst case and leaves the margin', () => {
    const budget = partBudget(partCriteria, receiverCriteria);
    const sum = budget.contributions.reduce((total, { ppm }) => total + ppm, 0);
    expect(budget.worstCasePpm).toBeCloseTo(sum, 12);
    expect(budget.contributions[0]).toEqual({ name: 'frequency tolerance', ppm: 10 });
    expect(budget.contributions.map(({ name }) => name)).toEqual([
      'frequency tolerance',
      'temperature',
      'ageing',
      'supply',
      'load',
      'far end',
      'Doppler',
    ]);
    expect(budget.marginPpm).toBeCloseTo(budget.allowancePpm! - budget.worstCasePpm, 12);
    expect(budget.rootSumSquarePpm).toBeLessThan(budget.worstCasePpm);
  });

  it('takes the wider side of lopsided limits', () => {
    const lopsided = { ...partCriteria, toleranceLowPpm: -12, toleranceHighPpm: 5 };
    expect(partBudget(lopsided, receiverCriteria).contributions[0]!.ppm).toBe(12);
    const upperOnly = { ...partCriteria, toleranceLowPpm: null };
    expect(partBudget(upperOnly, receiverCriteria).contributions[0]!.ppm).toBe(10);
  });
});
