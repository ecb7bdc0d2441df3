import { percent, percentPair } from '../../format/percent';
import { type FindingReason, type WorstLinks } from './input';

/** Would radios made with these units work? Judged by the bound, not the estimate. */
export function linkReasons(links: WorstLinks | null): FindingReason[] {
  if (links === null)
    return [
      {
        kind: 'links',
        weight: 'note',
        text: 'The part names no receiver; whether links would work was not judged.',
      },
    ];
  const { receiverName, shareOutside, upperBound, allowedShare } = links;
  const [bound, allowed] = percentPair(upperBound, allowedShare);
  if (upperBound <= allowedShare) {
    const bounded = `(bound ${percent(upperBound)})`;
    const cases =
      shareOutside === 0
        ? `all cases computed ${bounded}`
        : `all but ${percent(shareOutside)} ${bounded} of cases`;
    return [
      {
        kind: 'links',
        weight: 'for',
        text: `Links made with these units stay in the symbol-rate region in ${cases}; the strictest receiver is ${receiverName}.`,
      },
    ];
  }
  if (shareOutside > allowedShare)
    return [
      {
        kind: 'links',
        weight: 'against',
        text: `Links with ${receiverName} leave the symbol-rate region in ${percentPair(shareOutside, allowedShare)[0]} (bound ${bound}) of cases; ${percentPair(allowedShare, shareOutside)[0]} is allowed.`,
      },
    ];
  const estimate = shareOutside === 0 ? 'no case computed' : `${percent(shareOutside)} of cases`;
  return [
    {
      kind: 'links',
      weight: 'against',
      text: `Links with ${receiverName} leave the symbol-rate region in ${estimate}, but up to ${bound} cannot be ruled out; ${allowed} is allowed.`,
    },
  ];
}
