import * as contract from '@shared/contract/mail';
import { route } from '../http/route';
import { readMail, readMails } from '../services/mail/read-mails';
import { resendMail } from '../services/mail/resend-mail';

export const mailRoutes = [
  route(contract.listMail, ({ query }) => readMails(query)),
  route(contract.readMail, ({ params }) => readMail(params.id)),
  route(contract.resendMail, async ({ actor, params }) => {
    await resendMail(actor, params.id);
    return readMail(params.id);
  }),
];
