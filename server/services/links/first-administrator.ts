import { act } from '../../history/act';
import { system } from '../../http/actor';
import { Person } from '../../models';
import { issueLink } from './issue-link';

/** Act `first_administrator.offer`: a one-time link while there is nobody, else null. A new one replaces the last. */
export async function firstAdministratorLink(): Promise<string | null> {
  if ((await Person.count()) > 0) return null;
  return act(system, 'first_administrator.offer', async (transaction) => {
    const { url, link } = await issueLink(transaction, 'first_administrator', null);
    return {
      result: url,
      entry: { recordType: 'link', recordId: link.id, after: { expiresAt: link.expiresAt } },
    };
  });
}
