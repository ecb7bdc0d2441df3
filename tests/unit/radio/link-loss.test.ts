import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linkLoss, matchedFilterLoss, RadioError, type ReceiverBands } from '@shared/radio';

const receiver: ReceiverBands = {
  carrierHz: 1e9,
  symbolRateHz: 1e5, // one symbol rate is 100 ppm
  pulse: { shape: 'root-raised-cosine', rollOff: 0.35 },
  frontEndBandwidthHz: 1e6,
};
const lot = fc.array(
  fc.integer({ min: -300, max: 300 }).map((v) => v / 10),
  { minLength: 1, maxLength: 30 },
);

describe('signal lost over the links of a lot', () => {
  it('is the loss of the one offset there is', () => {
    const loss = linkLoss({
      unitsPpm: [15],
      farEnd: { model: 'uniform', tolerancePpm: 0 },
      receiver,
    });
    const expected = matchedFilterLoss(receiver.pulse, 0.15);
    expect(loss.halfOfLinks.offsetPpm).toBeCloseTo(15, 6);
    expect(loss.nineteenOfTwenty.offsetHz).toBeCloseTo(15_000, 3);
    expect(loss.halfOfLinks.correlationPeakDb).toBeCloseTo(expected.correlationPeakDb!, 6);
    expect(loss.meanCorrelationPeakDb!).toBeCloseTo(expected.correlationPeakDb!, 2);
    expect(loss.meanOutputEnergyDb!).toBeCloseTo(expected.outputEnergyDb!, 2);
  });

  it('is the mean over every pair of two measured lots', () => {
    fc.assert(
      fc.property(lot, lot, (units, others) => {
        const loss = linkLoss({
          unitsPpm: units,
          farEnd: { model: 'measured', offsetsPpm: others },
          receiver,
        });
        let power = 0;
        for (const a of units) {
          for (const b of others) {
            power += matchedFilterLoss(receiver.pulse, (a - b) / 100).correlationPeakPower;
          }
        }
        const mean = 10 * Math.log10(power / units.length / others.length);
        expect(Math.abs(loss.meanCorrelationPeakDb! - mean)).toBeLessThan(0.02);
      }),
      { numRuns: 30 },
    );
  });

  it('only grows with motion and drift', () => {
    fc.assert(
      fc.property(lot, fc.integer({ min: 0, max: 10 }), (unitsPpm, halfWidthPpm) => {
        const farEnd = { model: 'normal', meanPpm: 0, sdPpm: 5 } as const;
        const still = linkLoss({ unitsPpm, farEnd, receiver });
        const moving = linkLoss({
          unitsPpm,
          farEnd,
          receiver,
          doppler: { model: 'worst-case', halfWidthPpm },
          serviceDriftPpm: 1,
        });
        expect(moving.meanCorrelationPeakDb!).toBeLessThanOrEqual(
          still.meanCorrelationPeakDb! + 0.01,
        );
        expect(moving.halfOfLinks.offsetPpm).toBeCloseTo(
          still.halfOfLinks.offsetPpm + halfWidthPpm + 1,
          5,
        );
      }),
      { numRuns: 30 },
    );
  });

  it('needs a unit', () => {
    expect(() =>
      linkLoss({ unitsPpm: [], farEnd: { model: 'uniform', tolerancePpm: 1 }, receiver }),
    ).toThrow(RadioError);
  });
});
