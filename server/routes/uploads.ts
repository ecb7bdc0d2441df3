import * as contract from '@shared/contract/uploads';
import { openEventStream } from '../http/event-stream';
import { actorOf } from '../http/mount';
import { NotSignedIn } from '../http/errors';
import { route } from '../http/route';
import { presentUpload } from '../presenters/uploads';
import { admit, lotOfPath } from '../services/uploads/admit';
import { findUpload } from '../services/uploads/find-upload';
import { streamProgress } from '../services/uploads/progress-events';
import { listUploads } from '../services/uploads/read-uploads';
import { admissionOf, receiveFile, receivedFile } from '../services/uploads/receive-file';
import { registerUpload } from '../services/uploads/register-upload';

const byPerson = receiveFile(async (request) => {
  const actor = actorOf(request);
  if (!actor) throw new NotSignedIn();
  return admit(request, await lotOfPath(request), actor);
});

export const uploadRoutes = [
  route(
    contract.uploadFile,
    ({ body, request, response }) =>
      registerUpload(receivedFile(request), admissionOf(response), body),
    byPerson,
  ),
  route(contract.listUploads, ({ params, query }) => listUploads(params.id, query)),
  route(contract.readUpload, async ({ params }) => presentUpload(await findUpload(params.id))),
  route(contract.streamUpload, async ({ params, request, response }) => {
    await findUpload(params.id);
    const stream = openEventStream(request, response);
    await streamProgress(params.id, stream, (stop) => request.on('close', stop));
  }),
];
