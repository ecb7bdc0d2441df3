import { type Request } from 'express';
import { Id } from '@shared/contract/common';
import { Conflict, NotAllowed, NotFound } from '../../http/errors';
import { type Actor } from '../../http/actor';
import { mayUpload } from '../../policies/lots';
import { Lot } from '../../models';
import { checkQuota } from './quota';
import { type Admission } from './receive-file';

/** Whether this actor may upload to this lot now; asked before a byte of the file is read. */
export async function admit(
  request: Request,
  lot: Lot | null,
  actor: Actor,
  benchTokenId: string | null = null,
): Promise<Admission> {
  if (!lot) throw new NotFound('This lot');
  refuseClosedLot(actor, lot);
  const announced = Number(request.headers['content-length'] ?? 0);
  await checkQuota(
    { personId: actor.kind === 'person' ? actor.id : null, benchTokenId },
    Number.isFinite(announced) ? announced : 0,
  );
  return { lot, actor, benchTokenId };
}

export async function lotOfPath(request: Request): Promise<Lot | null> {
  const id = Id.safeParse(request.params.id);
  return id.success ? Lot.findByPk(id.data) : null;
}

export function refuseClosedLot(actor: Actor, lot: Lot): void {
  if (mayUpload(actor, lot.state)) return;
  if (!['technician', 'quality_engineer', 'bench'].includes(actor.role)) throw new NotAllowed();
  throw new Conflict(
    'lot.closed',
    `Lot ${lot.lotNumber} is ${lot.state.replaceAll('_', ' ')}: no readings are taken for it any more.`,
  );
}
