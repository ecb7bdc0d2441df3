const MONTHS = 'Jan Feb Mar Apr May Jun Jul Aug Sep Oct Nov Dec'.split(' ');

/** A calendar day, '2 Mar 2026'. A plain 'YYYY-MM-DD' is that day everywhere; an instant needs the zone it is read in. */
export function date(value: string | Date | null | undefined, zone = 'UTC'): string {
  const plain = typeof value === 'string' ? /^(\d{4})-(\d{2})-(\d{2})$/.exec(value) : null;
  if (plain) return dayText(Number(plain[1]), Number(plain[2]), Number(plain[3]));
  const parts = partsIn(value, zone);
  return parts === null ? '–' : dayText(parts.year, parts.month, parts.day);
}

/** An instant with its zone, '2 Mar 2026, 14:05 UTC'. */
export function dateTime(
  value: string | Date | null | undefined,
  zone = 'UTC',
  { seconds = false }: { seconds?: boolean } = {},
): string {
  const parts = partsIn(value, zone);
  if (parts === null) return '–';
  const clock = [parts.hour, parts.minute, ...(seconds ? [parts.second] : [])].map(twoDigits);
  return `${dayText(parts.year, parts.month, parts.day)}, ${clock.join(':')} ${parts.zone}`;
}

/** A time of day with its zone, '14:05 UTC'. */
export function timeOfDay(value: string | Date | null | undefined, zone = 'UTC'): string {
  const parts = partsIn(value, zone);
  return parts === null ? '–' : `${twoDigits(parts.hour)}:${twoDigits(parts.minute)} ${parts.zone}`;
}

function partsIn(value: string | Date | null | undefined, zone: string) {
  if (value === null || value === undefined || value === '') return null;
  const instant = value instanceof Date ? value : new Date(value);
  if (Number.isNaN(instant.getTime())) return null;
  const parts = new Map(
    new Intl.DateTimeFormat('en-GB', {
      timeZone: zone,
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
      hourCycle: 'h23',
      timeZoneName: 'short',
    })
      .formatToParts(instant)
      .map(({ type, value: text }) => [type, text] as const),
  );
  const number = (type: Intl.DateTimeFormatPartTypes) => Number(parts.get(type));
  return {
    year: number('year'),
    month: number('month'),
    day: number('day'),
    hour: number('hour'),
    minute: number('minute'),
    second: number('second'),
    zone: parts.get('timeZoneName') ?? zone,
  };
}

function dayText(year: number, month: number, day: number): string {
  return `${day}\u00a0${MONTHS[month - 1] ?? '?'}\u00a0${year}`;
}

function twoDigits(value: number): string {
  return String(value).padStart(2, '0');
}
