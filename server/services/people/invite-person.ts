import { type BodyOf } from '@shared/contract/endpoint';
import { type invitePerson as contract } from '@shared/contract/people';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Person } from '../../models';
import { mailLink } from '../links/mail-link';
import { refuseTakenEmail, refuseUnknownSupplier } from './find-person';

/** Act `person.invite`: an account without a password, and a mail with the link to choose one. */
export function invitePerson(actor: Actor, input: BodyOf<typeof contract>): Promise<string> {
  return act(actor, 'person.invite', async (transaction) => {
    const { name, email, role, supplierId } = input;
    await refuseTakenEmail(transaction, email);
    await refuseUnknownSupplier(transaction, supplierId);
    const person = await Person.create(
      { name, email, role, supplierId, state: 'invited' },
      { transaction },
    );
    await mailLink(transaction, person, 'by an administrator');
    return {
      result: person.id,
      entry: {
        recordType: 'person',
        recordId: person.id,
        after: { role, supplierId, state: 'invited' },
        personal: { after: { name, email } },
      },
    };
  });
}
