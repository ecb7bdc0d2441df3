import { type Disposition as DispositionView } from '@shared/contract/dispositions';
import { NotFound } from '../../http/errors';
import { Analysis, ConcessionFile, Disposition, Hold, Lot, Signature } from '../../models';
import { presentDisposition } from '../../presenters/disposition';

export async function readDispositions(
  lotId: string,
): Promise<{ items: DispositionView[]; next: null }> {
  const lot = await Lot.findByPk(lotId);
  if (!lot) throw new NotFound('This lot');
  const dispositions = await Disposition.findAll({
    where: { lotId },
    include: [{ model: Analysis, as: 'analysis', attributes: ['id', 'version'] }, 'signer'],
    order: [['number', 'DESC']],
  });
  const ids = dispositions.map((d) => d.id);
  const [signatures, holds, approvals] = await Promise.all([
    Signature.findAll({ where: { recordType: 'disposition', recordId: ids }, order: ['signedAt'] }),
    Hold.findAll({ where: { dispositionId: ids }, attributes: ['id', 'dispositionId'] }),
    ConcessionFile.findAll({
      where: { dispositionId: ids },
      attributes: { exclude: ['bytes'] },
      include: [{ association: 'sender', attributes: ['name'] }],
      order: ['sentAt', 'id'],
    }),
  ]);
  return {
    items: dispositions.map((d) =>
      presentDisposition(
        d,
        lot,
        signatures.filter((s) => s.recordId === d.id),
        holds.find((hold) => hold.dispositionId === d.id)?.id ?? null,
        approvals.filter((file) => file.dispositionId === d.id),
      ),
    ),
    next: null,
  };
}

export async function readDisposition(id: string): Promise<DispositionView> {
  const disposition = await Disposition.findByPk(id);
  if (!disposition) throw new NotFound('This decision');
  const { items } = await readDispositions(disposition.lotId);
  return items.find((item) => item.id === id)!;
}

/** Lots that may share the cause: same part, supplier and date code, not yet held or rejected. */
export async function readContainment(lotId: string) {
  const lot = await Lot.findByPk(lotId);
  if (!lot) throw new NotFound('This lot');
  const others =
    lot.dateCode === ''
      ? []
      : await Lot.findAll({
          where: {
            partId: lot.partId,
            supplierId: lot.supplierId,
            dateCode: lot.dateCode,
            state: [
              'received',
              'under_inspection',
              'awaiting_disposition',
              'accepted',
              'accepted_under_concession',
            ],
          },
          order: ['lotNumber'],
          limit: 200,
        });
  return {
    items: others
      .filter((other) => other.id !== lotId)
      .map(({ id, lotNumber, state, dateCode, lotSize }) => ({
        id,
        lotNumber,
        state,
        dateCode,
        lotSize,
      })),
    next: null,
  };
}
