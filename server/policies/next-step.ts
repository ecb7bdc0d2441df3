import { type LotState } from '@shared/contract/lots';
import { countOf } from '@shared/format/counts';
import { type Actor } from '../http/actor';

export interface NextFacts {
  state: LotState;
  unitsPlanned: number;
  unitsMeasured: number;
  uploadsRunning: number;
  awaitingSecondFrom: string | null;
  hold: {
    state: 'open' | 'acknowledged' | 'answered' | 'closed';
    acknowledgementDueAt: Date;
    answerDueAt: Date;
  } | null;
}

export interface NextStep {
  text: string;
  overdue: boolean;
  /** The person who asks is the one to do it. */
  mine: boolean;
}

const measuring = (actor: Actor) => actor.role === 'technician';
const judging = (actor: Actor) => actor.role === 'quality_engineer';

/** One phrase: what comes next for a lot, and whether it waits for the person who asks. */
export function nextStep(actor: Actor, facts: NextFacts, now = new Date()): NextStep {
  const calm = (text: string, mine = false): NextStep => ({ text, overdue: false, mine });
  const owed = facts.unitsPlanned - facts.unitsMeasured;
  if (facts.uploadsRunning > 0) return calm('reading upload');
  switch (facts.state) {
    case 'received':
      return calm('not started', measuring(actor));
    case 'under_inspection':
      if (owed <= 0)
        return calm(judging(actor) ? 'see what is owed' : 'more is owed', measuring(actor));
      return calm(`${countOf(owed, 'unit')} to measure`, measuring(actor));
    case 'awaiting_disposition':
      if (facts.awaitingSecondFrom)
        return calm('second signature', judging(actor) && facts.awaitingSecondFrom !== actor.id);
      return calm('sign', judging(actor));
    case 'on_hold':
      if (facts.awaitingSecondFrom)
        return calm('second signature', judging(actor) && facts.awaitingSecondFrom !== actor.id);
      return holdStep(actor, facts.hold, now);
    default:
      return calm('');
  }
}

function holdStep(actor: Actor, hold: NextFacts['hold'], now: Date): NextStep {
  if (!hold || hold.state === 'closed')
    return { text: 'decide again', overdue: false, mine: judging(actor) };
  if (hold.state === 'answered')
    return { text: 'read answer', overdue: false, mine: judging(actor) };
  const due = hold.state === 'open' ? hold.acknowledgementDueAt : hold.answerDueAt;
  const lateDays = Math.floor((now.getTime() - due.getTime()) / 86_400_000);
  if (now > due)
    return {
      text: lateDays < 1 ? 'overdue since today' : `overdue by ${lateDays} d`,
      overdue: true,
      mine: false,
    };
  return {
    text: hold.state === 'open' ? 'supplier to acknowledge' : 'supplier to answer',
    overdue: false,
    mine: false,
  };
}
