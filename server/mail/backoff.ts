/** Tries before a mail is given up: about eleven hours, a night of a broken mail server. */
export const greatestTries = 12;
/** Tries that may each have delivered the mail: nobody gets the same mail more often than this. */
export const greatestUncertainTries = 3;

const firstWaitSeconds = 20;
const greatestWaitSeconds = 6 * 3600;

/**
 * Seconds until the next try after `tries` failed ones: doubling, with up to a quarter of chance on either side, so
 * that mails refused together do not come back together. `random` is a number from 0 to 1.
 */
export function waitSeconds(tries: number, random: number): number {
  const wait = Math.min(greatestWaitSeconds, firstWaitSeconds * 2 ** Math.max(0, tries - 1));
  return wait * (0.75 + 0.5 * random);
}
