import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  governingReceiver,
  type NamedReceiver,
  RadioError,
  type Receiver,
  receiverAllowance,
  regimeBounds,
  regimeOf,
} from '@shared/radio';

const receiver: Receiver = {
  carrierHz: 2.4e9,
  symbolRateHz: 1e6,
  pulse: { shape: 'root-raised-cosine', rollOff: 0.35 },
  frontEndBandwidthHz: 4e6,
  farEndTolerancePpm: 20,
  greatestSpeedMps: 0,
  serviceLifeYears: 10,
  allowedShareBeyond: 0.001,
};

const anyReceiver: fc.Arbitrary<Receiver> = fc.record({
  carrierHz: fc.double({ min: 1e8, max: 1e10, noNaN: true }),
  symbolRateHz: fc.double({ min: 1e3, max: 1e7, noNaN: true }),
  pulse: fc.double({ min: 0, max: 1, noNaN: true }).map((rollOff) => ({
    shape: 'root-raised-cosine' as const,
    rollOff,
  })),
  frontEndBandwidthHz: fc.double({ min: 1e3, max: 1e8, noNaN: true }),
  shareOfSymbolRate: fc.double({ min: 0.01, max: 0.5, noNaN: true }),
  farEndTolerancePpm: fc.double({ min: 0, max: 50, noNaN: true }),
  greatestSpeedMps: fc.double({ min: 0, max: 8000, noNaN: true }),
  serviceLifeYears: fc.double({ min: 0, max: 20, noNaN: true }),
  allowedShareBeyond: fc.double({ min: 0, max: 1, noNaN: true }),
});

const ORDER = { 'symbol-rate': 0, oversampled: 1, 'outside-front-end': 2 };

describe('regions of offset', () => {
  it('never improve as the offset grows, and are the same for either sign', () => {
    const hz = fc.double({ min: 0, max: 1e7, noNaN: true });
    fc.assert(
      fc.property(anyReceiver, hz, hz, (r, x, y) => {
        const near = regimeOf(r, Math.min(x, y));
        const far = regimeOf(r, Math.max(x, y));
        expect(ORDER[near.regime]).toBeLessThanOrEqual(ORDER[far.regime]);
        expect(near.samplesPerSymbol).toBeLessThanOrEqual(far.samplesPerSymbol);
        expect(regimeOf(r, -x)).toEqual(regimeOf(r, x));
      }),
    );
  });

  it('give an offset on a boundary to the better region', () => {
    const bounds = regimeBounds(receiver);
    expect(regimeOf(receiver, bounds.symbolRateHz).regime).toBe('symbol-rate');
    expect(regimeOf(receiver, bounds.frontEndWholeHz).regime).toBe('oversampled');
    expect(regimeOf(receiver, bounds.frontEndWholeHz + 1).regime).toBe('outside-front-end');
    expect(regimeOf(receiver, bounds.matchedFilterNothingHz).detail).toBe('partly-in-front-end');
    expect(regimeOf(receiver, bounds.frontEndNothingHz).detail).toBe('nothing-in-front-end');
  });

  it('leave nothing workable where the front end is too narrow for the signal itself', () => {
    const narrow = { ...receiver, frontEndBandwidthHz: 1e6 };
    expect(regimeBounds(narrow).frontEndWholeHz).toBeLessThan(0);
    expect(regimeOf(narrow, 0).regime).toBe('outside-front-end');
    expect(receiverAllowance(narrow).totalPpm).toBe(0);
  });
});

describe('allowance of a receiver', () => {
  // 15 % of 1 Msymbol/s at 2.4 GHz is 150 kHz, 62.5 ppm in total, 31.25 ppm per end (arithmetic).
  it('is what the far end, motion and drift leave of the region', () => {
    const allowance = receiverAllowance(receiver, {
      temperaturePpm: 10,
      ageingPpmPerYear: 0.5,
      supplyPpm: 1,
    });
    expect(allowance.totalHz).toBe(150e3);
    expect(allowance.totalPpm).toBeCloseTo(62.5, 12);
    expect(allowance.equalEndsPpm).toBeCloseTo(31.25, 12);
    expect(allowance.usedUpPpm).toBeCloseTo(36, 12);
    expect(allowance.remainsPpm).toBeCloseTo(26.5, 12);
    expect(allowance.remainsHz).toBeCloseTo(26.5 * 2400, 6);
  });

  it('is larger for a receiver that corrects before its matched filter', () => {
    expect(receiverAllowance(receiver, {}, 'front-end').totalHz).toBe(1_325_000);
  });

  it('goes below zero instead of hiding that nothing is left', () => {
    expect(receiverAllowance({ ...receiver, farEndTolerancePpm: 70 }).remainsPpm).toBeCloseTo(
      -7.5,
      9,
    );
  });

  it('shrinks by what every further drift takes', () => {
    const drift = fc.double({ min: 0, max: 20, noNaN: true });
    fc.assert(
      fc.property(anyReceiver, drift, drift, (r, temperaturePpm, loadPpm) => {
        const before = receiverAllowance(r, { temperaturePpm }).remainsPpm;
        const after = receiverAllowance(r, { temperaturePpm, loadPpm }).remainsPpm;
        expect(before - after).toBeCloseTo(loadPpm, 6);
      }),
    );
  });
});

describe('many receivers for one part', () => {
  it('the strictest governs and is named', () => {
    const gateway: NamedReceiver = { ...receiver, name: 'gateway' };
    const meter: NamedReceiver = {
      ...receiver,
      name: 'meter',
      symbolRateHz: 4e5,
      frontEndBandwidthHz: 1e6,
    };
    const { governing, demands } = governingReceiver([gateway, meter], { temperaturePpm: 2 });
    expect(governing.name).toBe('meter');
    expect(demands.map(({ name }) => name)).toEqual(['meter', 'gateway']);
    expect(governing.allowance.remainsPpm).toBeCloseTo(25 - 22, 9);
  });

  it('needs at least one', () => {
    expect(() => governingReceiver([])).toThrow(RadioError);
  });
});
