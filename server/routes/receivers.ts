import * as contract from '@shared/contract/receivers';
import { route } from '../http/route';
import { addReceiver, changeReceiver } from '../services/receivers/keep-receivers';
import { readReceiver, readReceivers } from '../services/receivers/read-receivers';
import { approveRevision } from '../services/revisions/approve-revision';
import { changeRevision, draftRevision } from '../services/revisions/draft-revision';

export const receiverRoutes = [
  route(contract.listReceivers, ({ query }) => readReceivers(query)),
  route(contract.addReceiver, async ({ actor, body }) =>
    readReceiver(await addReceiver(actor, body)),
  ),
  route(contract.readReceiver, ({ params }) => readReceiver(params.id)),
  route(contract.changeReceiver, async ({ actor, params, body }) => {
    await changeReceiver(actor, params.id, body);
    return readReceiver(params.id);
  }),
  route(contract.addReceiverRevision, async ({ actor, params, body }) => {
    await draftRevision('receiver', actor, params.id, body);
    return readReceiver(params.id);
  }),
  route(contract.changeReceiverRevision, async ({ actor, params, body }) => {
    await changeRevision('receiver', actor, params.id, params.revisionId, body);
    return readReceiver(params.id);
  }),
  route(contract.approveReceiverRevision, async ({ actor, params, body }) => {
    await approveRevision('receiver', actor, params.id, params.revisionId, body);
    return readReceiver(params.id);
  }),
];
