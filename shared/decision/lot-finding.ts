import { count, countOf } from '../format/counts';
import { widenPlan } from '../sampling/widen-plan';
import { benchReasons } from './finding/bench-reasons';
import { requireCoherent } from './finding/checks';
import { headline } from './finding/headline';
import { type FindingReason, type LotFinding, type LotFindingInput } from './finding/input';
import { linkReasons } from './finding/link-reasons';
import { planReasons } from './finding/plan-reasons';
import { shapeReasons } from './finding/shape-reasons';

export {
  type FindingBench,
  type FindingReason,
  type LotFinding,
  type LotFindingInput,
  type WorstLinks,
} from './finding/input';

/**
 * What the readings say about a lot: accept or hold, in sentences. It supports the person who decides; it does not decide.
 * Accept only when nothing speaks against: the plan is met by what the decision rule takes, enough units were
 * measured, the strictest receiver's upper bound lies within its allowed share, the bench carries the readings, and
 * the assumptions of the plan stand. Every reason to hold is said, not only the first.
 * More units than the plan asked for are judged by the widened plan.
 * @throws StatisticsError when the numbers cannot belong to one lot
 */
export function lotFinding(input: LotFindingInput): LotFinding {
  requireCoherent(input);
  const plan = widenPlan(input.plan, input.units.measured);
  const measuredAny = input.units.measured > 0;
  const reasons = [
    ...inspectionReasons(input),
    ...unitReasons(input),
    ...(measuredAny ? planReasons(input, plan) : []),
    ...(measuredAny || input.links === null ? linkReasons(input.links) : []),
    ...(measuredAny ? shapeReasons(input) : []),
    ...(measuredAny ? benchReasons(input) : []),
    ...rowReasons(input),
  ];
  const ordered = [...reasons.filter(isAgainst), ...reasons.filter((reason) => !isAgainst(reason))];
  return {
    decision: ordered.some(isAgainst) ? 'hold' : 'accept',
    headline: headline(input, plan, ordered),
    reasons: ordered,
  };
}

const isAgainst = ({ weight }: FindingReason) => weight === 'against';

function unitReasons({ units, plan }: LotFindingInput): FindingReason[] {
  const owed = plan.sampleSize;
  if (units.measured >= owed) return [];
  if (units.measured === 0)
    return [
      {
        kind: 'units',
        weight: 'against',
        text: `None of the ${countOf(owed, 'unit')} owed has been measured.`,
      },
    ];
  const missing = owed - units.measured;
  return [
    {
      kind: 'units',
      weight: 'against',
      text: `${count(units.measured)} of the ${countOf(owed, 'unit')} owed ${units.measured === 1 ? 'has' : 'have'} been measured; ${count(missing)} ${missing === 1 ? 'is' : 'are'} missing.`,
    },
  ];
}

function inspectionReasons({ inspectionState = 'normal' }: LotFindingInput): FindingReason[] {
  if (inspectionState === 'normal') return [];
  if (inspectionState === 'discontinued')
    return [
      {
        kind: 'inspection',
        weight: 'against',
        text: 'Acceptance of this part from this supplier is discontinued until the corrective action has been agreed.',
      },
    ];
  return [
    {
      kind: 'inspection',
      weight: 'note',
      text: `The lot was inspected under ${inspectionState} inspection.`,
    },
  ];
}

function rowReasons({ refusedRows }: LotFindingInput): FindingReason[] {
  if (refusedRows === 0) return [];
  return [
    {
      kind: 'rows',
      weight: 'note',
      text: `${countOf(refusedRows, 'row')} of the readings ${refusedRows === 1 ? 'was' : 'were'} refused and ${refusedRows === 1 ? 'is' : 'are'} not judged here.`,
    },
  ];
}
