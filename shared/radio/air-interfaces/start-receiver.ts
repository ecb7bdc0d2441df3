import { type AirInterface } from './air-interface';
import { type Pulse } from '../pulse';

/** A beginning of a receiver's description: what the standard says, and what a person still has to give. */
export interface ReceiverStart {
  carrierHz: number;
  /** Rate of the pulses that reach the matched filter: chips where the signal is spread, else symbols. */
  symbolRateHz: number | null;
  pulse: Pulse | null;
  /** The channel bandwidth, as a first figure: the front end's own passband has to be measured. */
  frontEndBandwidthHz: number | null;
  farEndTolerancePpm: number | null;
  missing: ('symbolRateHz' | 'pulse' | 'frontEndBandwidthHz' | 'farEndTolerancePpm')[];
}

function pulseOf({ pulse }: AirInterface): Pulse | null {
  return pulse?.shape === 'root-raised-cosine' && pulse.rollOff !== undefined
    ? { shape: 'root-raised-cosine', rollOff: pulse.rollOff }
    : null;
}

/**
 * Fills a receiver from an air interface. Nothing is guessed: a half-sine or Gaussian pulse, or many
 * subcarriers, fit neither pulse of the matched-filter model, so the pulse is left to the person.
 * A tolerance relative to the received carrier is the mobile's own; for the far end (the base) it
 * says nothing and is left out.
 */
export function startReceiver(entry: AirInterface): ReceiverStart {
  const { tolerance, referenceCarrierHz } = entry;
  let farEndTolerancePpm: number | null = null;
  if (tolerance?.relativeTo === 'absolute') {
    farEndTolerancePpm =
      'ppm' in tolerance ? tolerance.ppm : (tolerance.hz / referenceCarrierHz) * 1e6;
  }
  const start = {
    symbolRateHz: entry.chipRateHz ?? entry.symbolRateHz ?? null,
    pulse: pulseOf(entry),
    frontEndBandwidthHz: entry.channelBandwidthHz ?? null,
    farEndTolerancePpm,
  };
  const missing = (Object.keys(start) as (keyof typeof start)[]).filter(
    (key) => start[key] === null,
  );
  return { carrierHz: referenceCarrierHz, ...start, missing };
}
