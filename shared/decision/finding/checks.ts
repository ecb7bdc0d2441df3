import { requireFinite, requireShare, requireWhole } from '../../statistics/checks';
import { StatisticsError } from '../../statistics/errors';
import { requireLimits, requireNotNegative } from '../checks';
import { type LotFindingInput } from './input';

/** Throws when the numbers handed over cannot belong to one lot. */
export function requireCoherent(input: LotFindingInput): void {
  const { units, beyond, guard, links, plan } = input;
  requireWhole(units.lotSize, 'units.lotSize', 1);
  requireWhole(units.measured, 'units.measured');
  requireLimits(input.limits);
  requireWhole(beyond.count, 'beyond.count');
  requireShare(beyond.share, 'beyond.share');
  requireShare(beyond.upperBound, 'beyond.upperBound');
  requireNotNegative(guard.guardBandPpm, 'guard.guardBandPpm');
  requireWhole(guard.notProvenInside, 'guard.notProvenInside');
  requireWhole(guard.notProvenOutside, 'guard.notProvenOutside');
  requireWhole(input.outliers, 'outliers');
  requireWhole(input.refusedRows, 'refusedRows');
  if (beyond.count + guard.notProvenInside > units.measured)
    throw new StatisticsError(
      'out_of_range',
      'beyond.count',
      'and the units not proven cannot exceed the units measured',
    );
  if (guard.notProvenOutside > beyond.count)
    throw new StatisticsError(
      'out_of_range',
      'guard.notProvenOutside',
      'cannot exceed the units beyond the limits',
    );
  if (links !== null) {
    requireShare(links.shareOutside, 'links.shareOutside');
    requireShare(links.upperBound, 'links.upperBound');
    requireShare(links.allowedShare, 'links.allowedShare');
  }
  if (input.normality !== null) {
    requireFinite(input.normality.a2, 'normality.a2');
    requireShare(input.normality.p, 'normality.p');
  }
  if (plan.kind === 'variables' && units.measured >= plan.sampleSize && !input.variables)
    throw new StatisticsError('out_of_range', 'variables', 'must be given for a plan by variables');
}
