import { type Actor } from '../http/actor';

export type HoldState = 'open' | 'acknowledged' | 'answered' | 'closed';
type Held = { state: HoldState; supplierId: string };

/** A supplier contact reads the holds of the own supplier; for all others of the house every hold is theirs to read. */
export function mayReadHold(actor: Actor, hold: Pick<Held, 'supplierId'>): boolean {
  if (actor.role === 'supplier_contact') return actor.supplierId === hold.supplierId;
  return ['technician', 'quality_engineer', 'auditor', 'administrator'].includes(actor.role);
}

function isContact(actor: Actor, hold: Held): boolean {
  return actor.role === 'supplier_contact' && actor.supplierId === hold.supplierId;
}

/** Once, and first of all. */
export function mayAcknowledge(actor: Actor, hold: Held): boolean {
  return isContact(actor, hold) && hold.state === 'open';
}

/** After the acknowledgement, and again until the hold is closed: a first answer is often not the last. */
export function mayAnswer(actor: Actor, hold: Held): boolean {
  return isContact(actor, hold) && (hold.state === 'acknowledged' || hold.state === 'answered');
}

/** Both sides, until the hold is closed. */
export function mayWrite(actor: Actor, hold: Held): boolean {
  return hold.state !== 'closed' && (isContact(actor, hold) || actor.role === 'quality_engineer');
}

/** Which side of the conversation a person speaks for. */
export function sideOf(actor: Actor): 'house' | 'supplier' {
  return actor.role === 'supplier_contact' ? 'supplier' : 'house';
}

interface Turn {
  kind: string;
  side: 'house' | 'supplier' | 'system';
}

/** True when the other side has asked something that `side` has not replied to; `turns` are in order of time. */
export function owesReply(turns: readonly Turn[], side: 'house' | 'supplier'): boolean {
  const other = side === 'house' ? 'supplier' : 'house';
  const said = turns.filter(
    (turn) =>
      (turn.kind === 'question' && turn.side === other) ||
      (turn.side === side && ['question', 'reply', 'answer'].includes(turn.kind)),
  );
  return said.at(-1)?.side === other;
}

/** Past the moment at which the supplier's next step was due. */
export function isOverdue(
  hold: { state: HoldState; acknowledgementDueAt: Date; answerDueAt: Date },
  now: Date,
): boolean {
  const due = dueNow(hold);
  return due !== null && due.getTime() < now.getTime();
}

/** When the supplier's next step is due; null once the house has the word. */
export function dueNow(hold: {
  state: HoldState;
  acknowledgementDueAt: Date;
  answerDueAt: Date;
}): Date | null {
  if (hold.state === 'open') return hold.acknowledgementDueAt;
  if (hold.state === 'acknowledged') return hold.answerDueAt;
  return null;
}
