import { opening, listOf, spelledCount } from '../../format/counts';
import { formatNumber } from '../../format/number';
import { ppm } from '../../format/ppm';
import { type FindingReason, type LotFindingInput } from './input';

const SIGNIFICANCE = 0.05;

/** What the distribution looks like, and whether the plan's assumptions stand. */
export function shapeReasons({
  normality,
  outliers,
  clusterCentresPpm,
  plan,
}: LotFindingInput): FindingReason[] {
  const byVariables = plan.kind === 'variables';
  const doubt = byVariables ? 'against' : 'note';
  const reasons: FindingReason[] = [];
  const mixed = clusterCentresPpm && clusterCentresPpm.length > 1 ? clusterCentresPpm : null;
  if (normality !== null) {
    const figures = `(A² ${formatNumber(normality.a2, { decimals: 2 })}, ${pText(normality.p)})`;
    if (normality.p >= SIGNIFICANCE)
      reasons.push({ kind: 'normality', weight: 'note', text: normalText(figures, outliers) });
    else {
      const consequence = byVariables
        ? 'the plan by variables does not hold for it'
        : 'trust the counted share rather than the normal estimate';
      const subject =
        outliers > 0 ? 'The lot is not normal even without its outliers' : 'The lot is not normal';
      reasons.push({
        kind: 'normality',
        weight: doubt,
        text: `${subject} ${figures}; ${consequence}.`,
      });
    }
  }
  if (outliers > 0 && (normality === null || normality.p < SIGNIFICANCE || byVariables))
    reasons.push({
      kind: 'outliers',
      weight: doubt,
      text: byVariables
        ? `${opening(spelledCount(outliers, 'outlier'))} ${outliers === 1 ? 'stands' : 'stand'} apart from the body of the lot; mean and spread do not describe ${outliers === 1 ? 'it' : 'them'}, and the plan by variables rests on them.`
        : `${opening(spelledCount(outliers, 'unit'))} ${outliers === 1 ? 'stands' : 'stand'} apart from the body of the lot.`,
    });
  if (mixed !== null) {
    const centres = listOf(mixed.map((centre) => ppm(centre, { sign: 'always' })));
    reasons.push({
      kind: 'clusters',
      weight: doubt,
      text: `The offsets gather round ${centres}; the lot may mix blanks or production runs${byVariables ? ', and the plan by variables presumes one normal lot' : ''}.`,
    });
  }
  return reasons;
}

function normalText(figures: string, outliers: number): string {
  if (outliers === 0) return `The lot agrees with a normal distribution ${figures}.`;
  const units = spelledCount(outliers, 'unit');
  const are =
    outliers === 1 ? `the ${units} apart is an outlier` : `the ${units} apart are outliers`;
  return `The body of the lot is normal ${figures}; ${are}, not a wide process.`;
}

function pText(p: number): string {
  return p < 0.001 ? 'p below 0.001' : `p ${formatNumber(p, { significant: 2 })}`;
}
