/** The zone this person reads times in; every time says it. */
export const timeZone = Intl.DateTimeFormat().resolvedOptions().timeZone || 'UTC';
