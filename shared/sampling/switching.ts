import { countOf, listOf, spelledCount } from '../format/counts';
import { attributePlanForLot } from './attribute-plan';
import { type SamplingRule, type Severity } from './rule';
import { AQL_PERCENTS } from './tables/attribute-master';

export type InspectionState = Severity | 'discontinued';

/** One lot of the record, as first inspected. */
export interface SwitchingLot {
  lotNumber: string;
  lotSize: number;
  /** Did the sample meet the plan? Not the disposition: a concession does not make a lot good. */
  accepted: boolean;
  /** Units of the sample that the decision rule did not take: what the plan counts. */
  beyond: number;
  /** A lot offered again after sorting does not count. */
  resubmitted?: boolean;
  /** False ends reduced inspection: production interrupted or irregular. Default true. */
  productionSteady?: boolean;
  /** True when, before this lot, the supplier's corrective action was agreed; it ends a discontinuation. */
  correctiveActionAgreed?: boolean;
}

export interface SwitchingChange {
  afterLot: string;
  from: InspectionState;
  to: InspectionState;
  why: string;
}

export interface SwitchingResult {
  state: InspectionState;
  /** What the next lot is inspected with; tightened when discontinued. */
  severity: Severity;
  /** Why the state is what it is and what would change it, in sentences. */
  sentences: string[];
  changes: SwitchingChange[];
  /** Progress towards reduced inspection, 0 to 30; only normal inspection has it. */
  score: number;
}

export interface SwitchingOptions {
  /** Reduced inspection needs the consent of the responsible person. Default true. */
  reducedAllowed?: boolean;
  /** The supplier's corrective action was agreed after the last lot: it ends a discontinuation. Default false. */
  correctiveActionAgreed?: boolean;
}

export const REDUCED_FROM_SCORE = 30;
const RECENT_LOTS = 5;
const REFUSED_OF_RECENT = 2;
const ACCEPTED_TO_RELAX = 5;
const REFUSED_TO_DISCONTINUE = 5;

/** What has been seen since the present state began. */
interface Progress {
  state: InspectionState;
  recent: SwitchingLot[];
  acceptedInARow: number;
  refusedTightened: number;
  score: number;
}

const begin = (state: InspectionState): Progress => ({
  state,
  recent: [],
  acceptedInARow: 0,
  refusedTightened: 0,
  score: 0,
});

/**
 * Normal, tightened, reduced or discontinued inspection for the next lot of a part from a supplier.
 * - normal to tightened: two of five or fewer lots in a row not accepted
 * - tightened to normal: five lots in a row accepted
 * - tightened to discontinued: five lots not accepted while tightened
 * - discontinued to tightened: the supplier's corrective action has been agreed
 * - normal to reduced: switching score of 30 (an accepted lot adds 3 if the plan accepts 2 or more and the lot would
 *   have passed an AQL one step tighter, 2 if the plan accepts 0 or 1; otherwise the score starts again), steady
 *   production, and consent
 * - reduced to normal: a lot not accepted, a count between the two numbers, or irregular production
 * Counting starts anew with each change. Variables plans score 2 for each accepted lot.
 * @param lots every lot of this part and supplier, oldest first
 * Source: MIL-STD-105E, 4.5 to 4.7 (switching, discontinuation); the score of ISO 2859-1:1999, 9.3.3, in place of
 * the older limit numbers; both from memory.
 */
export function switchingState(
  rule: SamplingRule,
  lots: readonly SwitchingLot[],
  { reducedAllowed = true, correctiveActionAgreed = false }: SwitchingOptions = {},
): SwitchingResult {
  if (rule.kind === 'zeroAcceptance' || rule.kind === 'everyUnit') return oneSeverity(rule.kind);
  let progress = begin('normal');
  const changes: SwitchingChange[] = [];
  for (const lot of lots) {
    if (progress.state === 'discontinued' && lot.correctiveActionAgreed) {
      const why = `the supplier’s corrective action was agreed before lot ${lot.lotNumber}`;
      changes.push({ afterLot: lot.lotNumber, from: 'discontinued', to: 'tightened', why });
      progress = begin('tightened');
    }
    if (lot.resubmitted || progress.state === 'discontinued') continue;
    const step = STEPS[progress.state](progress, lot, rule, reducedAllowed);
    if (step === null) continue;
    changes.push({ afterLot: lot.lotNumber, from: progress.state, ...step });
    progress = begin(step.to);
  }
  const lastLot = lots.at(-1);
  if (progress.state === 'discontinued' && correctiveActionAgreed && lastLot) {
    const why = 'the supplier’s corrective action was agreed';
    changes.push({ afterLot: lastLot.lotNumber, from: 'discontinued', to: 'tightened', why });
    progress = begin('tightened');
  }
  return {
    state: progress.state,
    severity: progress.state === 'discontinued' ? 'tightened' : progress.state,
    sentences: explain(progress, changes, lots.length, reducedAllowed),
    changes,
    score: progress.score,
  };
}

type AcceptingRule = Extract<SamplingRule, { kind: 'attribute' | 'variables' }>;
type Step = (
  progress: Progress,
  lot: SwitchingLot,
  rule: AcceptingRule,
  reducedAllowed: boolean,
) => { to: InspectionState; why: string } | null;

const STEPS: Record<Severity, Step> = {
  normal(progress, lot, rule, reducedAllowed) {
    progress.recent = [...progress.recent, lot].slice(-RECENT_LOTS);
    progress.score = scoreAfter(progress.score, lot, rule);
    const refused = progress.recent.filter(({ accepted }) => !accepted);
    if (refused.length >= REFUSED_OF_RECENT) {
      const names = listOf(refused.map(({ lotNumber }) => lotNumber));
      const span = progress.recent.length - progress.recent.indexOf(refused[0]!);
      return {
        to: 'tightened',
        why: `two of the last ${spelledCount(span, 'lot')} were not accepted (${names})`,
      };
    }
    if (progress.score >= REDUCED_FROM_SCORE && reducedAllowed && lot.productionSteady !== false)
      return {
        to: 'reduced',
        why: `the switching score reached ${REDUCED_FROM_SCORE} with lot ${lot.lotNumber}`,
      };
    return null;
  },
  tightened(progress, lot) {
    progress.acceptedInARow = lot.accepted ? progress.acceptedInARow + 1 : 0;
    if (!lot.accepted) progress.refusedTightened += 1;
    if (progress.acceptedInARow >= ACCEPTED_TO_RELAX)
      return { to: 'normal', why: 'five lots in a row were accepted under tightened inspection' };
    if (progress.refusedTightened >= REFUSED_TO_DISCONTINUE)
      return { to: 'discontinued', why: 'five lots were not accepted under tightened inspection' };
    return null;
  },
  reduced(_progress, lot, rule) {
    const { lotNumber } = lot;
    if (!lot.accepted)
      return { to: 'normal', why: `lot ${lotNumber} was not accepted under reduced inspection` };
    if (
      rule.kind === 'attribute' &&
      lot.beyond >
        attributePlanForLot(lot.lotSize, rule.level, rule.aqlPercent, 'reduced').acceptanceNumber
    )
      return {
        to: 'normal',
        why: `lot ${lotNumber} was accepted, but with more units beyond the limits than the acceptance number of reduced inspection`,
      };
    if (lot.productionSteady === false)
      return { to: 'normal', why: `production was not steady at lot ${lotNumber}` };
    return null;
  },
};

function scoreAfter(score: number, lot: SwitchingLot, rule: AcceptingRule): number {
  if (!lot.accepted) return 0;
  if (rule.kind === 'variables') return Math.min(REDUCED_FROM_SCORE, score + 2);
  const { level, aqlPercent } = rule;
  const { acceptanceNumber } = attributePlanForLot(lot.lotSize, level, aqlPercent, 'normal');
  if (acceptanceNumber < 2) return Math.min(REDUCED_FROM_SCORE, score + 2);
  const tighterAql = AQL_PERCENTS[AQL_PERCENTS.indexOf(aqlPercent) - 1] ?? aqlPercent;
  const tighter = attributePlanForLot(lot.lotSize, level, tighterAql, 'normal');
  return lot.beyond <= tighter.acceptanceNumber ? Math.min(REDUCED_FROM_SCORE, score + 3) : 0;
}

const NAMES: Record<InspectionState, string> = {
  normal: 'Normal inspection',
  tightened: 'Tightened inspection',
  reduced: 'Reduced inspection',
  discontinued: 'Acceptance is discontinued',
};

function explain(
  progress: Progress,
  changes: SwitchingChange[],
  lots: number,
  reducedAllowed: boolean,
): string[] {
  const last = changes[changes.length - 1];
  const since = last
    ? `${NAMES[progress.state]} since lot ${last.afterLot}: ${last.why}.`
    : lots === 0
      ? 'Normal inspection: no lot of this part from this supplier has been judged yet.'
      : `Normal inspection, as from the first lot: the ${countOf(lots, 'lot')} on record gave no reason to change.`;
  return [since, ...outlook(progress, reducedAllowed)];
}

function outlook(progress: Progress, reducedAllowed: boolean): string[] {
  switch (progress.state) {
    case 'normal': {
      const refused = progress.recent.filter(({ accepted }) => !accepted).length;
      const warning =
        refused === 0
          ? 'Two lots not accepted within five bring tightened inspection.'
          : 'One of the last five lots was not accepted; one more within five lots brings tightened inspection.';
      const score = reducedAllowed
        ? `The switching score is ${progress.score}; at ${REDUCED_FROM_SCORE}, with steady production, reduced inspection begins.`
        : 'Reduced inspection has not been allowed for this part.';
      return [warning, score];
    }
    case 'tightened':
      return [
        `Five lots accepted in a row end it; so far ${spelledCount(progress.acceptedInARow, 'lot')}.`,
        `Five lots not accepted under tightened inspection discontinue acceptance; so far ${spelledCount(progress.refusedTightened, 'lot')}.`,
      ];
    case 'reduced':
      return [
        'A lot not accepted, a count between the two numbers of the plan, or irregular production brings back normal inspection.',
      ];
    case 'discontinued':
      return ['It resumes, tightened, when the supplier’s corrective action has been agreed.'];
  }
}

function oneSeverity(kind: 'zeroAcceptance' | 'everyUnit'): SwitchingResult {
  const sentence =
    kind === 'everyUnit'
      ? 'Every unit is inspected; there is nothing to tighten or reduce.'
      : 'A zero-acceptance plan is computed for each lot from its size and knows one severity only.';
  return { state: 'normal', severity: 'normal', sentences: [sentence], changes: [], score: 0 };
}
