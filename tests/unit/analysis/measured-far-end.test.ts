import { describe, expect, it } from 'vitest';
import { judgeLinksWithLot } from '@shared/analysis/links';
import { partDrift, radioReceiver } from '@shared/analysis/drift';
import { PartCriteria } from '@shared/contract/parts';
import { ReceiverCriteria } from '@shared/contract/receivers';
import { dopplerPpm } from '@shared/radio/doppler';
import { serviceDrift } from '@shared/radio/allowance';
import { regimeBoundsPpm } from '@shared/radio/regimes';

const criteria = ReceiverCriteria.parse({
  carrierHz: '2440000000',
  symbolRateHz: '1000000',
  pulse: 'root_raised_cosine',
  rollOff: 0.35,
  frontEndBandwidthHz: '2000000',
  farEndTolerancePpm: 20,
  greatestSpeedMps: 30,
  allowedShareBeyond: 0.01,
});
const part = PartCriteria.parse({
  nominalFrequencyHz: '16000000',
  toleranceLowPpm: -10,
  toleranceHighPpm: 10,
  stabilityPpm: 15,
  samplingRule: { kind: 'attribute', level: 'II', aqlPercent: 0.25 },
  decisionRule: { kind: 'simple' },
});
const receiver = { receiverId: 'r', revisionId: 'v', name: 'R', revision: 'A', criteria };

/** Counts pairs one by one, with the far end's sign as the radio has it: the difference of the two ends. */
function countedShare(units: number[], far: number[]): number {
  const drift = serviceDrift(partDrift(part, criteria.serviceLifeYears), criteria.serviceLifeYears);
  const spent = drift.reduce((sum, { halfWidthPpm }) => sum + halfWidthPpm, 0) + dopplerPpm(30);
  const limit = regimeBoundsPpm(radioReceiver(criteria)).symbolRateRegionPpm - spent;
  const pairs = units.flatMap((u) => far.map((b) => Math.abs(u - b)));
  return pairs.filter((offset) => offset > limit).length / pairs.length;
}

describe('links with another measured lot at the far end', () => {
  it('counts every pair, signs kept', () => {
    const units = [-9, -2, 0, 4, 40];
    const far = [-30, -8, 1, 35];
    const links = judgeLinksWithLot(
      Float64Array.from(units),
      part,
      receiver,
      Float64Array.from(far),
    );
    const expected = countedShare(units, far);
    expect(expected).toBeGreaterThan(0);
    expect(links.beyondSymbolRate.share).toBeCloseTo(expected, 12);
    expect(
      links.symbolRate.share + links.severalSamples.share + links.outsideFrontEnd.share,
    ).toBeCloseTo(1, 12);
    expect(links.beyondSymbolRate.upperBound).toBeGreaterThan(expected);
  });

  it('does not take the tolerance of the far end on top of its readings', () => {
    const near = judgeLinksWithLot(Float64Array.of(-1, 1), part, receiver, Float64Array.of(-1, 1));
    expect(near.beyondSymbolRate.share).toBe(0);
    const far = judgeLinksWithLot(Float64Array.of(-1, 1), part, receiver, Float64Array.of(-20, 20));
    expect(far.symbolRate.lossDb!).toBeGreaterThan(near.symbolRate.lossDb!);
  });
});
