import { broadcast } from './broadcast';
import { cellular } from './cellular';
import { landMobile } from './land-mobile';
import { shortRange } from './short-range';
import { type AirInterface, type Certainty } from './air-interface';

export type { AirInterface, AirInterfaceTolerance, Certainty } from './air-interface';
export { startReceiver, type ReceiverStart } from './start-receiver';

/** Published radio interfaces to start a receiver from, doubtful ones left out. */
export const airInterfaces: readonly AirInterface[] = [
  ...shortRange,
  ...cellular,
  ...landMobile,
  ...broadcast,
];

/** What a person reads beside an entry. */
export const CERTAINTY_TEXT: Record<Certainty, string> = {
  read: 'Text of the clause or table read in a public copy',
  'read-quotation': 'Sentence read as quoted in public material',
  'read-secondary': 'Value read in public material that cites the standard',
  'memory-high': 'From memory, consistent in several places; check against the standard',
};
