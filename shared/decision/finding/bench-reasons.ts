import { date } from '../../format/dates';
import { formatNumber } from '../../format/number';
import { limitsPpm } from '../../format/ppm';
import { expandedUncertainty } from '../../format/uncertainty';
import { type FindingReason, type LotFindingInput } from './input';

/** Half the width of the limits should be at least four times U when uncertainty is left out of the rule (common practice). */
const SIMPLE_RULE_RATIO = 4;

/** Do the readings deserve to carry a decision? */
export function benchReasons({ bench, guard, limits }: LotFindingInput): FindingReason[] {
  if (bench === null) {
    const needed = guard.rule.kind !== 'simple';
    const text = needed
      ? 'No bench is named, so the uncertainty that the decision rule needs is not known.'
      : 'No bench is named; how well the units were measured is not known.';
    return [{ kind: 'bench', weight: needed ? 'against' : 'note', text }];
  }
  const reasons: FindingReason[] = [];
  if (!bench.inCalibration)
    reasons.push({
      kind: 'bench',
      weight: bench.calibrationRequired === false ? 'note' : 'against',
      text: `The calibration of ${bench.name} was due on ${date(bench.calibrationDue)}; the readings were taken out of calibration.`,
    });
  if (limits.lowPpm === null || limits.highPpm === null) return reasons;
  const halfWidthPpm = (limits.highPpm - limits.lowPpm) / 2;
  const uncertainty = expandedUncertainty(bench.expandedUncertaintyPpm, 'ppm');
  if (guard.rule.kind === 'guardedAcceptance' && guard.guardBandPpm >= halfWidthPpm)
    reasons.push({
      kind: 'bench',
      weight: 'against',
      text: `Guard bands of ${expandedUncertainty(guard.guardBandPpm, 'ppm')} leave no room within ${limitsPpm(limits)}: on ${bench.name} no unit can be shown to conform.`,
    });
  else if (bench.expandedUncertaintyPpm * SIMPLE_RULE_RATIO > halfWidthPpm * (1 + 1e-9)) {
    const ratio = formatNumber(halfWidthPpm / bench.expandedUncertaintyPpm, { significant: 2 });
    const simple = guard.rule.kind === 'simple';
    reasons.push({
      kind: 'bench',
      weight: simple ? 'against' : 'note',
      text: simple
        ? `The uncertainty of ${bench.name}, U = ${uncertainty}, is too large for simple acceptance within ${limitsPpm(limits)}: the ratio is ${ratio}, and ${SIMPLE_RULE_RATIO} is common practice.`
        : `The uncertainty of ${bench.name}, U = ${uncertainty}, is large beside the limits ${limitsPpm(limits)} (ratio ${ratio}); the guard bands take much of the room.`,
    });
  }
  return reasons;
}
