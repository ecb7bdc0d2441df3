import { type Transaction } from 'sequelize';
import { type BandStripInput } from '@shared/band-strip/types';
import { date, dateTime } from '@shared/format/dates';
import { count } from '@shared/format/counts';
import { type Actor } from '../../http/actor';
import {
  Hold,
  HoldMessage,
  Part,
  Supplier,
  type Analysis,
  type Disposition,
  type Lot,
} from '../../models';
import { holdNumber } from './hold-number';
import { tellHouse, tellSupplier } from './tell';

export interface HoldOpening {
  lot: Lot;
  disposition: Disposition;
  analysis: Analysis;
  actor: Actor;
  acknowledgementDays: number;
  answerDays: number;
  reason: string;
  /** The finding of the signed analysis in sentences. */
  findingSentences: string[];
  strip: BandStripInput | null;
}

const dayMs = 24 * 3600 * 1000;

/**
 * Opens the conversation on a held lot: the hold, its notice, and a mail to every active contact of the supplier. Part
 * of the act that signs the disposition; writes no history entry of its own. When the supplier has nobody who could be
 * told, the quality engineers are told that.
 */
export async function openHold(transaction: Transaction, opening: HoldOpening): Promise<Hold> {
  const { lot, disposition, analysis, actor, reason, findingSentences, strip } = opening;
  const openedAt = new Date();
  const supplier = (await Supplier.findByPk(lot.supplierId, { transaction }))!;
  const part = (await Part.findByPk(lot.partId, { transaction }))!;
  const after = (days: number) => new Date(openedAt.getTime() + days * dayMs);
  const hold = await Hold.create(
    {
      number: await holdNumber(transaction, lot),
      lotId: lot.id,
      supplierId: lot.supplierId,
      dispositionId: disposition.id,
      analysisId: analysis.id,
      reason,
      finding: findingSentences,
      bandStrip: strip as Hold['bandStrip'],
      acknowledgementDueAt: after(opening.acknowledgementDays),
      // Nobody answers before having acknowledged.
      answerDueAt: after(Math.max(opening.answerDays, opening.acknowledgementDays)),
      openedAt,
    },
    { transaction },
  );
  await HoldMessage.create(
    { holdId: hold.id, kind: 'notice', authorId: actor.id, side: 'house', text: reason },
    { transaction },
  );
  const context = { hold, lot, supplier };
  const facts: [string, string][] = [
    ['Hold', hold.number],
    ['Lot', lot.lotNumber],
    ['Part', part.partNumber],
    ['Units', count(lot.lotSize)],
    ...(lot.dateCode ? ([['Date code', lot.dateCode]] as [string, string][]) : []),
    ...(lot.purchaseOrder ? ([['Purchase order', lot.purchaseOrder]] as [string, string][]) : []),
    ['Received', date(lot.receivedOn)],
    ['Acknowledge by', dateTime(hold.acknowledgementDueAt)],
    ['Answer by', dateTime(hold.answerDueAt)],
    ['Signed by', `${actor.name}, quality engineer`],
  ];
  const told = await tellSupplier(transaction, context, {
    kind: 'hold.notice',
    subject: `${hold.number}: a lot of yours is on hold`,
    paragraphs: [
      `We have put a lot from ${supplier.name} on hold. Please acknowledge this notice, then answer with containment, cause and corrective action.`,
      reason,
      ...findingSentences,
    ],
    facts,
    ...(strip ? { strip } : {}),
    linkLabel: 'Read and acknowledge',
  });
  if (told === 0) {
    await tellHouse(transaction, context, {
      kind: 'hold.nobody_told',
      subject: `${hold.number}: nobody at the supplier was told`,
      paragraphs: [
        `${supplier.name} has no active contact, so the notice reached nobody. Ask an administrator to invite one; until then tell them by other means.`,
      ],
      facts,
      linkLabel: 'Open the hold',
    });
  }
  return hold;
}
