import { airInterfaces, startReceiver, type AirInterface } from '@shared/radio/air-interfaces';
import { hertz, symbolRate } from '@shared/format/hertz';
import { formatNumber } from '@shared/format/number';
import { ppm } from '@shared/format/ppm';
import { type ReceiverCriteriaValues } from './receiver-form';

export const airInterfaceOf = (id: string | null): AirInterface | null =>
  airInterfaces.find((entry) => entry.id === id) ?? null;

export const sourceText = ({ source }: AirInterface): string =>
  source.clause ? `${source.standard}, ${source.clause}` : source.standard;

/** What the published interface says of each field of the form, in words; only fields it speaks of. */
export function saidByInterface(
  entry: AirInterface,
): Partial<Record<keyof ReceiverCriteriaValues, string>> {
  const start = startReceiver(entry);
  const said: Partial<Record<keyof ReceiverCriteriaValues, string>> = {
    carrierHz: hertz(start.carrierHz),
  };
  if (start.symbolRateHz !== null) said.symbolRateHz = symbolRate(start.symbolRateHz);
  if (start.pulse?.shape === 'root-raised-cosine') said.rollOff = formatNumber(start.pulse.rollOff);
  if (start.frontEndBandwidthHz !== null)
    said.frontEndBandwidthHz = hertz(start.frontEndBandwidthHz);
  if (start.farEndTolerancePpm !== null) said.farEndTolerancePpm = ppm(start.farEndTolerancePpm);
  return said;
}

/** The values a form starts with from an interface; what it leaves open is emptied, so that nothing of another one stays. */
export function startValues(entry: AirInterface): Partial<ReceiverCriteriaValues> {
  const start = startReceiver(entry);
  const text = (value: number | null) => (value === null ? '' : String(value));
  return {
    airInterfaceId: entry.id,
    carrierHz: text(start.carrierHz),
    symbolRateHz: text(start.symbolRateHz),
    ...(start.pulse?.shape === 'root-raised-cosine'
      ? { pulse: 'root_raised_cosine' as const, rollOff: start.pulse.rollOff }
      : { rollOff: null }),
    frontEndBandwidthHz: text(start.frontEndBandwidthHz),
    farEndTolerancePpm: start.farEndTolerancePpm,
  };
}
