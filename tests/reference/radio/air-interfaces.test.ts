import { describe, expect, it } from 'vitest';
import { airInterfaces, startReceiver } from '@shared/radio';
import { readData } from './cases';

interface Limit {
  id: string;
  kind: string;
  air_interface: string;
  reference_carrier_hz: number;
  carrier_bands_hz: [number, number][];
  tolerance: { ppm: number | null; hz: number | null; relative_to: string };
  symbol_rate_hz: number | null;
  chip_rate_hz: number | null;
  subcarrier_spacing_hz: number | null;
  channel_bandwidth_hz: number | null;
  channel_spacing_hz: number | null;
  source: { standard: string };
  certainty: string;
}

const limits: Limit[] = JSON.parse(readData('radio-limits.json')).limits;
const trusted = limits.filter(
  ({ kind, certainty }) =>
    kind === 'radio' && (certainty.startsWith('read') || certainty === 'memory-high'),
);

describe('air interfaces to start a receiver from', () => {
  it('lists every interface that was read or is recalled with confidence, and no other', () => {
    expect(airInterfaces.map(({ id }) => id).sort()).toEqual(trusted.map(({ id }) => id).sort());
  });

  it.each(trusted)('$id stands as collected', (limit) => {
    const entry = airInterfaces.find(({ id }) => id === limit.id)!;
    expect(entry.name).toBe(limit.air_interface);
    expect(entry.referenceCarrierHz).toBe(limit.reference_carrier_hz);
    expect(entry.carrierBandsHz).toEqual(limit.carrier_bands_hz);
    const tolerance: { ppm?: number; hz?: number } = entry.tolerance ?? {};
    expect(tolerance.ppm ?? null).toBe(limit.tolerance.ppm);
    expect(tolerance.hz ?? null).toBe(limit.tolerance.hz);
    expect(entry.symbolRateHz ?? null).toBe(limit.symbol_rate_hz);
    expect(entry.chipRateHz ?? null).toBe(limit.chip_rate_hz);
    expect(entry.subcarrierSpacingHz ?? null).toBe(limit.subcarrier_spacing_hz);
    expect(entry.channelBandwidthHz ?? null).toBe(limit.channel_bandwidth_hz);
    expect(entry.channelSpacingHz ?? null).toBe(limit.channel_spacing_hz);
    expect(entry.source.standard).toBe(limit.source.standard);
    expect(entry.certainty.startsWith('read')).toBe(limit.certainty.startsWith('read'));
    expect(entry.howKnown).not.toMatch(/as above/);
  });

  it('starts a receiver with what the standard says and names what it does not say', () => {
    const wideband = startReceiver(airInterfaces.find(({ id }) => id === 'utra-bs-local-area')!);
    expect(wideband).toEqual({
      carrierHz: 2.14e9,
      symbolRateHz: 3.84e6,
      pulse: { shape: 'root-raised-cosine', rollOff: 0.22 },
      frontEndBandwidthHz: 5e6,
      farEndTolerancePpm: 0.1,
      missing: [],
    });
    const lowEnergy = startReceiver(airInterfaces.find(({ id }) => id === 'ble-1m')!);
    expect(lowEnergy.farEndTolerancePpm).toBeCloseTo(150e3 / 2440, 9);
    expect(lowEnergy.missing).toEqual(['pulse']);
    const satellite = startReceiver(airInterfaces.find(({ id }) => id === 'dvbs2-35')!);
    expect(satellite.missing).toEqual(['farEndTolerancePpm']);
  });
});
