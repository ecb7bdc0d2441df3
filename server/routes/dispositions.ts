import * as contract from '@shared/contract/dispositions';
import { route } from '../http/route';
import { sendAttachment } from '../http/send-attachment';
import {
  addCustomerApproval,
  readCustomerApproval,
} from '../services/dispositions/customer-approval';
import { writeCertificate } from '../services/dispositions/read-certificate';
import {
  readContainment,
  readDisposition,
  readDispositions,
} from '../services/dispositions/read-dispositions';
import { countersign, refuseSecond } from '../services/dispositions/second-signature';
import { signDisposition } from '../services/dispositions/sign-disposition';
import { sortLot } from '../services/dispositions/sort-lot';
import { evidenceOf, evidenceParser } from '../services/holds/evidence-parser';

export const dispositionRoutes = [
  route(contract.listDispositions, ({ params }) => readDispositions(params.id)),
  route(contract.signDisposition, async ({ actor, params, body }) =>
    readDisposition(await signDisposition(actor, params.id, body)),
  ),
  route(contract.countersignDisposition, async ({ actor, params, body }) => {
    await countersign(actor, params.id, body);
    return readDisposition(params.id);
  }),
  route(contract.refuseDisposition, async ({ actor, params, body }) => {
    await refuseSecond(actor, params.id, body.reason);
    return readDisposition(params.id);
  }),
  route(
    contract.addCustomerApproval,
    async ({ actor, params, request }) => {
      await addCustomerApproval(actor, params.id, evidenceOf(request));
      return readDisposition(params.id);
    },
    evidenceParser,
  ),
  route(contract.downloadCustomerApproval, async ({ params, response }) =>
    sendAttachment(response, await readCustomerApproval(params.id, params.fileId)),
  ),
  route(contract.proposeContainment, ({ params }) => readContainment(params.id)),
  route(contract.readCertificate, ({ params, query, response }) =>
    writeCertificate(params.id, query.dispositionId, response),
  ),
  route(contract.sortLot, async ({ actor, params, body }) => ({
    subLotId: await sortLot(actor, params.id, body),
  })),
];
