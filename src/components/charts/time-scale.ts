const scales = [
  { name: 'days', seconds: 86_400 },
  { name: 'hours', seconds: 3600 },
  { name: 'minutes', seconds: 60 },
  { name: 'seconds', seconds: 1 },
] as const;

/** The largest unit of time of which the span holds two or more. */
export function timeScale(spanS: number) {
  return scales.find(({ seconds }) => spanS >= 2 * seconds) ?? scales[3];
}
