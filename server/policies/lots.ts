import { type Decision } from '@shared/contract/dispositions';
import { type LotState } from '@shared/contract/lots';
import { type Actor } from '../http/actor';

/** What the policies need to know of a lot. */
export interface LotFacts {
  state: LotState;
  hasAnalysis: boolean;
  /** Readings came after the hold was signed: the lot was inspected again. */
  inspectedSinceHold: boolean;
  /** A concession waits for its second signature; who signed first. */
  awaitingSecondFrom: string | null;
  /** Something stands between the lot and acceptance. */
  owes: boolean;
  everDecided: boolean;
  /** 100 % inspection was ordered before; ordering it again says nothing new. */
  everyUnitOrdered: boolean;
}

const inspecting: LotState[] = ['received', 'under_inspection', 'awaiting_disposition'];

/** Readings may come as long as the lot may still be used: a signed acceptance then falls and the lot is judged anew. */
export function mayUpload(actor: Actor, state: LotState): boolean {
  return ['technician', 'quality_engineer', 'bench'].includes(actor.role) && state !== 'rejected';
}

/**
 * Which decisions fit the state, whoever asks. From hold a lot is accepted only after it was inspected again
 * (ISO 9001:2015 8.7.1: conformity is verified after correction); an accepted lot can only be held, when a nonconforming
 * unit turns up later; nothing follows a rejection.
 */
export function decisionsFor(facts: LotFacts): Decision[] {
  if (!facts.hasAnalysis || facts.awaitingSecondFrom) return [];
  const orderEveryUnit: Decision[] = facts.everyUnitOrdered ? [] : ['inspect_all'];
  switch (facts.state) {
    case 'received':
      return [];
    case 'under_inspection':
    case 'awaiting_disposition':
      return [
        ...(facts.owes ? [] : (['accept'] as const)),
        'hold',
        'accept_under_concession',
        ...orderEveryUnit,
        'reject',
      ];
    case 'on_hold':
      return [
        ...(facts.inspectedSinceHold && !facts.owes ? (['accept'] as const) : []),
        'accept_under_concession',
        ...orderEveryUnit,
        'reject',
      ];
    case 'accepted':
    case 'accepted_under_concession':
      return ['hold'];
    case 'rejected':
      return [];
  }
}

export function mayDecide(actor: Actor, facts: LotFacts): Decision[] {
  return actor.role === 'quality_engineer' ? decisionsFor(facts) : [];
}

/** The second signature is another person's. */
export function mayCountersign(actor: Actor, facts: LotFacts): boolean {
  return (
    actor.role === 'quality_engineer' &&
    facts.awaitingSecondFrom !== null &&
    facts.awaitingSecondFrom !== actor.id
  );
}

export function mayRejudge(actor: Actor, facts: LotFacts): boolean {
  return (
    actor.role === 'quality_engineer' && facts.state !== 'rejected' && !facts.awaitingSecondFrom
  );
}

/** What was registered can be corrected until a decision rests on it. */
export function mayChangeLot(actor: Actor, facts: LotFacts): boolean {
  return (
    ['technician', 'quality_engineer'].includes(actor.role) &&
    inspecting.includes(facts.state) &&
    !facts.everDecided
  );
}
