import { type Mapping } from '@shared/contract/uploads';
import { reasonColumn } from '../header-check';

type Target = Mapping['columns'][number];
type Unit = Extract<Target, { target: 'frequency' }>['unit'];

export interface HeadingMeaning {
  target: Target['target'];
  /** Null: the heading does not say. */
  unit: Unit | null;
  temperatureC: number | null;
}

const units: [RegExp, Unit][] = [
  [/(^|[^a-z])mhz($|[^a-z])/, 'MHz'],
  [/(^|[^a-z])khz($|[^a-z])/, 'kHz'],
  [/(^|[^a-z])hz($|[^a-z])/, 'Hz'],
  [/(^|[^a-z])ppm($|[^a-z])/, 'ppm'],
  [/(^|[^a-z])ppb($|[^a-z])/, 'ppb'],
];

const plain = (target: Target['target']): HeadingMeaning => ({
  target,
  unit: null,
  temperatureC: null,
});

/** What a column heading of the trade says about its column; null when it says nothing we know. */
export function meaningOf(heading: string): HeadingMeaning | null {
  const name = heading.toLowerCase().replaceAll('_', ' ').replace(/\s+/g, ' ').trim();
  if (name === '') return null;
  if (name === reasonColumn) return plain('ignore');
  const unit = units.find(([pattern]) => pattern.test(name))?.[1] ?? null;
  const temperatureC = temperatureIn(name);
  if (
    temperatureC !== null &&
    (unit !== null || isOnlyTemperature(name) || /freq|offset|dev/.test(name))
  )
    return { target: 'frequency', unit, temperatureC };
  if (
    /^(serial( ?(no|nr|number|id))?\.?|s ?\/ ?n|sn|unit( ?(id|no|nr|number))?|dut|device( ?id)?|part ?id|crystal( ?(id|no))?)$/.test(
      name,
    )
  )
    return plain('serial');
  if (/elapsed|^(time|t) ?[([]?(s|sec|seconds)[)\]]?$|^seconds$/.test(name))
    return plain('elapsedSeconds');
  if (
    /freq|offset|deviation|d ?f ?\/ ?f|^f( |$|[([])|^(ppm|ppb|hz|khz|mhz)$/.test(name) ||
    (unit !== null && !/temp/.test(name))
  )
    return { target: 'frequency', unit, temperatureC: null };
  if (/temp|^t( ?[([]?°?c[)\]]?)?$|° ?c/.test(name)) return plain('temperature');
  if (/measured|time ?stamp|^date|^time( ?utc)?$|date ?time/.test(name)) return plain('measuredAt');
  if (/\besr\b|resist|^r ?1\b|^rr\b|ohm|ω/.test(name)) return plain('resistance');
  if (/load ?cap|^cl\b|\bpf\b/.test(name)) return plain('loadCapacitance');
  if (/supply|^v ?(cc|dd)\b|volt/.test(name)) return plain('supplyVoltage');
  if (/drive|\b[uµμ]w\b/.test(name)) return plain('driveLevel');
  return null;
}

function isOnlyTemperature(name: string): boolean {
  return /^[([]?(t ?[=@]? ?)?[+-]?\d{1,3}([.,]\d+)?( ?(°|deg)? ?c)?[)\]]?$/.test(name);
}

/** The temperature that a heading such as "-40", "f @ +85 °C" or "offset_ppm_25C" names. */
function temperatureIn(name: string): number | null {
  const match = isOnlyTemperature(name)
    ? /[+-]?\d{1,3}(?:[.,]\d+)?/.exec(name)
    : /(?:^|[\s@(=])([+-]?\d{1,3}(?:[.,]\d+)?) ?(?:°|deg)? ?c(?:$|[^a-z])/.exec(name);
  if (!match) return null;
  const value = Number((match[1] ?? match[0]).replace(',', '.').replace(/^\+/, ''));
  return value >= -273 && value <= 500 ? value : null;
}
