/** The time zone of the machine at the desk; every time shown names it. */
export function useZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone || 'UTC';
}
