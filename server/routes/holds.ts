import * as contract from '@shared/contract/holds';
import { route } from '../http/route';
import { sendAttachment } from '../http/send-attachment';
import { acknowledgeHold } from '../services/holds/acknowledge-hold';
import { answerHold } from '../services/holds/answer-hold';
import { evidenceOf, evidenceParser } from '../services/holds/evidence-parser';
import { readAttachment, readHold, readHolds } from '../services/holds/read-holds';
import { writeHoldMessage } from '../services/holds/write-message';

export const holdRoutes = [
  route(contract.listHolds, ({ actor, query }) => readHolds(actor, query)),
  route(contract.readHold, ({ actor, params }) => readHold(actor, params.id)),
  route(contract.acknowledgeHold, async ({ actor, params, body }) => {
    await acknowledgeHold(actor, params.id, body.note);
    return readHold(actor, params.id);
  }),
  route(
    contract.answerHold,
    async ({ actor, params, body, request }) => {
      await answerHold(actor, params.id, body, evidenceOf(request));
      return readHold(actor, params.id);
    },
    evidenceParser,
  ),
  route(
    contract.askHold,
    async ({ actor, params, body, request }) => {
      await writeHoldMessage(actor, params.id, body.text, evidenceOf(request));
      return readHold(actor, params.id);
    },
    evidenceParser,
  ),
  route(contract.downloadAttachment, async ({ actor, params, response }) => {
    const file = await readAttachment(actor, params.id, params.attachmentId);
    sendAttachment(response, file);
  }),
];
