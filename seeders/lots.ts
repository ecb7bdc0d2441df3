import { randomUUID } from 'node:crypto';
import { Readable } from 'node:stream';
import { longTransaction } from '../server/database/connection';
import { type Actor } from '../server/http/actor';
import { Lot, Upload } from '../server/models';
import { registerLot } from '../server/services/lots/register-lot';
import { loadUpload } from '../server/services/uploads/load-upload';
import { registerUpload } from '../server/services/uploads/register-upload';
import { storeFile } from '../server/services/uploads/stored-file';

export interface LotSeed {
  lotNumber: string;
  partId: string;
  supplierId: string;
  dateCode: string;
  purchaseOrder: string;
  lotSize: number;
  receivedOn: string;
}

export async function seedLot(technician: Actor, lot: LotSeed): Promise<string> {
  return registerLot(technician, lot);
}

/** Takes a file the way the server does: stored as it came, then read by the worker's own code. */
export async function seedUpload(
  technician: Actor,
  lotId: string,
  benchId: string,
  fileName: string,
  csv: string,
): Promise<void> {
  const lot = (await Lot.findByPk(lotId))!;
  const transaction = await longTransaction();
  const uploadId = randomUUID();
  try {
    await Upload.create(
      { id: uploadId, lotId, fileName, uploadedBy: technician.id },
      { transaction },
    );
    const stored = await storeFile(transaction, uploadId, Readable.from([Buffer.from(csv)]));
    await registerUpload(
      { ...stored, transaction, uploadId, fileName },
      { lot, actor: technician, benchTokenId: null },
      { benchId },
    );
  } catch (error) {
    await transaction.rollback().catch(() => undefined);
    throw error;
  }
  await loadUpload(uploadId);
  const upload = (await Upload.findByPk(uploadId))!;
  if (upload.state !== 'done')
    throw new Error(
      `The demo file ${fileName} was not taken: ${upload.failure?.message ?? upload.state}`,
    );
}

/** Sets a lot's clock back, so that waiting times in the demo look lived in. Signatures and history keep their true time. */
export async function waitSince(lotId: string, hours: number): Promise<void> {
  await Lot.update(
    { stateSince: new Date(Date.now() - hours * 3_600_000) },
    { where: { id: lotId } },
  );
}
