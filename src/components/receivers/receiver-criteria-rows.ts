import { type ReceiverCriteria } from '@shared/contract/receivers';
import { hertz, symbolRate } from '@shared/format/hertz';
import { formatNumber } from '@shared/format/number';
import { percentAsSet } from '@shared/format/percent';
import { ppm } from '@shared/format/ppm';
import { type CriterionRow } from '@/components/criteria/criterion-row';
import { toPercent } from '@/components/criteria/form-values';
import { airInterfaceOf, sourceText } from './air-interface-text';

type Translate = (key: string, values?: Record<string, unknown>) => string;

/** A receiver's criteria in words, every one of them, in the order of the form. */
export function receiverCriteriaRows(c: ReceiverCriteria, t: Translate): CriterionRow[] {
  const row = (key: string, value: string) => ({
    key,
    label: t(`receivers.criterion.${key}`),
    value,
  });
  const air = airInterfaceOf(c.airInterfaceId);
  return [
    row('carrierHz', hertz(Number(c.carrierHz), { significant: 12 })),
    row('symbolRateHz', symbolRate(Number(c.symbolRateHz))),
    row('pulse', t(`receivers.pulse.${c.pulse}`)),
    row('rollOff', c.rollOff === null ? '' : formatNumber(c.rollOff, { significant: 6 })),
    row('frontEndBandwidthHz', hertz(Number(c.frontEndBandwidthHz), { significant: 12 })),
    row('shareOfSymbolRatePercent', percentAsSet(toPercent(c.shareOfSymbolRate))),
    row('farEndTolerancePpm', `±${ppm(c.farEndTolerancePpm)}`),
    row('farEndModel', t(`receivers.farEnd.${c.farEndModel}`)),
    row('greatestSpeedMps', `${formatNumber(c.greatestSpeedMps, { significant: 6 })}\u00a0m/s`),
    row('serviceLifeYears', `${formatNumber(c.serviceLifeYears)}\u00a0${t('receivers.years')}`),
    row('allowedShareBeyondPercent', percentAsSet(toPercent(c.allowedShareBeyond))),
    row('airInterfaceId', air ? `${air.name} (${sourceText(air)})` : (c.airInterfaceId ?? '')),
  ];
}
