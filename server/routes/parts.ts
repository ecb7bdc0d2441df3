import * as contract from '@shared/contract/parts';
import { route } from '../http/route';
import { addPart, changePart } from '../services/parts/keep-parts';
import { readPart, readParts } from '../services/parts/read-parts';
import { approveRevision } from '../services/revisions/approve-revision';
import { changeRevision, draftRevision } from '../services/revisions/draft-revision';

export const partRoutes = [
  route(contract.listParts, ({ query }) => readParts(query)),
  route(contract.addPart, async ({ actor, body }) => readPart(await addPart(actor, body))),
  route(contract.readPart, ({ params }) => readPart(params.id)),
  route(contract.changePart, async ({ actor, params, body }) => {
    await changePart(actor, params.id, body);
    return readPart(params.id);
  }),
  route(contract.addPartRevision, async ({ actor, params, body }) => {
    await draftRevision('part', actor, params.id, body);
    return readPart(params.id);
  }),
  route(contract.changePartRevision, async ({ actor, params, body }) => {
    await changeRevision('part', actor, params.id, params.revisionId, body);
    return readPart(params.id);
  }),
  route(contract.approvePartRevision, async ({ actor, params, body }) => {
    await approveRevision('part', actor, params.id, params.revisionId, body);
    return readPart(params.id);
  }),
];
