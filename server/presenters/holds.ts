import { type Hold as HoldView, type HoldRow } from '@shared/contract/holds';
import { dateTime } from '@shared/format/dates';
import { type Actor } from '../http/actor';
import { type Hold, type HoldMessage } from '../models';
import {
  isOverdue,
  mayAcknowledge,
  mayAnswer,
  mayWrite,
  owesReply,
  sideOf,
} from '../policies/holds';

/** Kind and side of questions and replies, in order of time: enough to tell who has the word. */
export type Turns = Pick<HoldMessage, 'kind' | 'side'>[];

/** Expects `lot` with `part`, and `supplier` loaded. */
export function presentHoldRow(hold: Hold, turns: Turns, actor: Actor, now = new Date()): HoldRow {
  const lot = hold.lot!;
  return {
    id: hold.id,
    number: hold.number,
    state: hold.state,
    lot: {
      id: lot.id,
      lotNumber: lot.lotNumber,
      state: lot.state,
      lotSize: lot.lotSize,
      dateCode: lot.dateCode,
      purchaseOrder: lot.purchaseOrder,
    },
    part: { partNumber: lot.part!.partNumber },
    supplier: { id: hold.supplierId, name: hold.supplier!.name },
    openedAt: hold.openedAt.toISOString(),
    acknowledgementDueAt: hold.acknowledgementDueAt.toISOString(),
    answerDueAt: hold.answerDueAt.toISOString(),
    acknowledgedAt: hold.acknowledgedAt?.toISOString() ?? null,
    answeredAt: hold.answeredAt?.toISOString() ?? null,
    closedAt: hold.closedAt?.toISOString() ?? null,
    overdue: isOverdue(hold, now),
    bandStrip: hold.bandStrip,
    next: nextOf(hold, turns, actor, now),
  };
}

/** Expects also `messages` (in order of time) with `author` and `attachments`. */
export function presentHold(hold: Hold, actor: Actor, now = new Date()): HoldView {
  const messages = hold.messages ?? [];
  const mayWriteNow = mayWrite(actor, hold);
  return {
    ...presentHoldRow(hold, messages, actor, now),
    reason: hold.reason,
    finding: hold.finding,
    messages: messages.map((message) => presentMessage(message, actor)),
    may: {
      acknowledge: mayAcknowledge(actor, hold),
      answer: mayAnswer(actor, hold),
      ask: mayWriteNow,
      reply: mayWriteNow && owesReply(messages, sideOf(actor)),
    },
    version: hold.version,
  };
}

function presentMessage(message: HoldMessage, actor: Actor): HoldView['messages'][number] {
  return {
    id: message.id,
    kind: message.kind,
    author: { name: authorName(message, actor), side: message.side },
    text: message.text,
    containment: message.containment,
    cause: message.cause,
    correctiveAction: message.correctiveAction,
    attachments: (message.attachments ?? []).map((file) => ({
      id: file.id,
      fileName: file.fileName,
      mediaType: file.mediaType,
      byteCount: file.byteCount,
      sha256: file.sha256,
    })),
    at: message.createdAt.toISOString(),
  };
}

/** A supplier reads the name of whoever signed; who else works here is not theirs to know. */
function authorName(message: HoldMessage, actor: Actor): string {
  if (message.side === 'system') return 'Quartzhold';
  const signed = message.kind === 'notice' || message.kind === 'closing';
  if (actor.role === 'supplier_contact' && message.side === 'house' && !signed)
    return 'Quality engineering';
  return message.author?.name ?? 'Quality engineering';
}

function nextOf(hold: Hold, turns: Turns, actor: Actor, now: Date): HoldRow['next'] {
  const supplierSide = actor.role === 'supplier_contact';
  const engineer = actor.role === 'quality_engineer';
  const name = hold.supplier!.name;
  if (hold.state === 'closed') return { text: 'Closed', mine: false };
  if (supplierSide && owesReply(turns, 'supplier') && hold.state !== 'open')
    return { text: 'Reply to our question', mine: true };
  if (!supplierSide && owesReply(turns, 'house'))
    return { text: `Reply to the question from ${name}`, mine: engineer };
  const late = isOverdue(hold, now);
  if (hold.state === 'answered')
    return supplierSide
      ? { text: 'We decide on your answer', mine: false }
      : { text: 'Read the answer and decide', mine: engineer };
  const act = hold.state === 'open' ? 'acknowledge' : 'answer';
  const due = dateTime(hold.state === 'open' ? hold.acknowledgementDueAt : hold.answerDueAt);
  if (supplierSide)
    return {
      text: `${act === 'acknowledge' ? 'Acknowledge' : 'Answer'} ${late ? `now: it was due ${due}` : `by ${due}`}`,
      mine: true,
    };
  const done = act === 'acknowledge' ? 'acknowledged' : 'answered';
  return {
    text: late ? `${name} has not ${done}; it was due ${due}` : `${name} is to ${act} by ${due}`,
    mine: false,
  };
}
