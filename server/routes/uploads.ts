import * as contract from '@shared/contract/uploads';
import { authenticateBench } from '../http/authenticate-bench';
import { NotFound, NotSignedIn } from '../http/errors';
import { openEventStream } from '../http/event-stream';
import { actorOf } from '../http/mount';
import { route } from '../http/route';
import { Lot } from '../models';
import { presentUpload } from '../presenters/uploads';
import { admit, lotOfPath } from '../services/uploads/admit';
import { checkFile } from '../services/uploads/check-file';
import { clearWarnings } from '../services/uploads/clear-warnings';
import { downloadOriginal } from '../services/uploads/download-original';
import { findUpload } from '../services/uploads/find-upload';
import { streamProgress } from '../services/uploads/progress-events';
import { listUploads } from '../services/uploads/read-uploads';
import { admissionOf, receiveFile, receivedFile } from '../services/uploads/receive-file';
import { receivePrefix, receivedPrefix } from '../services/uploads/receive-prefix';
import { listRefusedRows, writeRefusedCsv } from '../services/uploads/refused-rows';
import { registerUpload } from '../services/uploads/register-upload';
import { previewWithdrawal, withdrawUpload } from '../services/uploads/withdraw-upload';
import { findLotByNumber } from '../services/lots/find-lot';

const byPerson = receiveFile(async (request) => {
  const actor = actorOf(request);
  if (!actor) throw new NotSignedIn();
  return admit(request, await lotOfPath(request), actor);
});

const byBench = receiveFile(async (request) => {
  const { actor, tokenId } = await authenticateBench(request);
  return admit(request, await findLotByNumber(String(request.params.lotNumber)), actor, tokenId);
});

const lookedAt = receivePrefix(async (request) => {
  if (!(await lotOfPath(request))) throw new NotFound('This lot');
});

export const uploadRoutes = [
  route(
    contract.checkUpload,
    async ({ params, body, request }) => {
      const { prefix, fileName } = receivedPrefix(request);
      const lot = await Lot.findByPk(params.id);
      if (!lot) throw new NotFound('This lot');
      return checkFile(lot, prefix, body, fileName);
    },
    lookedAt,
  ),
  route(
    contract.uploadFile,
    ({ body, request, response }) =>
      registerUpload(receivedFile(request), admissionOf(response), body),
    byPerson,
  ),
  route(
    contract.uploadByMachine,
    ({ body, request, response }) => {
      const admission = admissionOf(response);
      return registerUpload(receivedFile(request), admission, {
        ...body,
        benchId: admission.actor.id,
      });
    },
    byBench,
  ),
  route(contract.listUploads, async ({ params, query }) => {
    if (!(await Lot.findByPk(params.id, { attributes: ['id'] }))) throw new NotFound('This lot');
    return listUploads(params.id, query);
  }),
  route(contract.readUpload, async ({ params }) => presentUpload(await findUpload(params.id))),
  route(contract.streamUpload, async ({ params, request, response }) => {
    await findUpload(params.id);
    const stream = openEventStream(request, response);
    await streamProgress(params.id, stream, (stop) => request.on('close', stop));
  }),
  route(contract.listRefusedRows, async ({ params, query }) =>
    listRefusedRows(await findUpload(params.id), query),
  ),
  route(contract.exportRefusedRows, async ({ params, response }) =>
    writeRefusedCsv(await findUpload(params.id), response),
  ),
  route(contract.downloadOriginal, async ({ params, response }) =>
    downloadOriginal(await findUpload(params.id), response),
  ),
  route(contract.clearWarnings, async ({ actor, params, body }) => {
    await clearWarnings(actor, params.id, body.reason);
    return presentUpload(await findUpload(params.id));
  }),
  route(contract.previewWithdrawal, ({ actor, params }) => previewWithdrawal(actor, params.id)),
  route(contract.withdrawUpload, async ({ actor, params, body }) => {
    await withdrawUpload(actor, params.id, body.reason);
    return presentUpload(await findUpload(params.id));
  }),
];
