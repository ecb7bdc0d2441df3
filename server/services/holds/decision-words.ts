import { type Disposition } from '../../models';

/** The second decision in one sentence for the supplier. */
export function decisionWords({
  decision,
  treatment,
}: Pick<Disposition, 'decision' | 'treatment'>): string {
  switch (decision) {
    case 'accept':
      return 'The lot is accepted.';
    case 'accept_under_concession':
      return 'The lot is accepted under concession.';
    case 'reject':
      return treatment === 'scrap'
        ? 'The lot is rejected; its units are scrapped.'
        : 'The lot is rejected and goes back to you.';
    case 'inspect_all':
      return 'Every unit of the lot is inspected and sorted.';
    case 'hold':
      return 'The lot stays on hold.';
  }
}
