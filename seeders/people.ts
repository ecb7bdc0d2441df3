import { type Role } from '../shared/contract/common';
import { act } from '../server/history/act';
import { system, type Actor } from '../server/http/actor';
import { Person } from '../server/models';
import { hashPassword } from '../server/services/sign-in/password';

/** Invented people. Their accounts exist in the demo only. */
const cast = {
  technician: { name: 'Tove Lindqvist', role: 'technician' },
  quality: { name: 'Ines Okafor', role: 'quality_engineer' },
  quality2: { name: 'Anselm Roy', role: 'quality_engineer' },
  supplier: { name: 'Pia Marlow', role: 'supplier_contact' },
  supplier2: { name: 'Jonas Ekdahl', role: 'supplier_contact' },
  auditor: { name: 'Ruth Castellan', role: 'auditor' },
  admin: { name: 'Sam Adeyemi', role: 'administrator' },
} as const satisfies Record<string, { name: string; role: Role }>;
export type CastMember = keyof typeof cast;

const emailOf = (member: string) => `${member}@quartzhold.test`;

export function demoPassphrase(): string {
  const passphrase = process.env.DEMO_PASSPHRASE;
  if (!passphrase || passphrase.length < 15)
    throw new Error('Setting DEMO_PASSPHRASE is missing or shorter than 15 characters');
  return passphrase;
}

/** Adds an account that can sign in at once; outside the demo people set their own password by a mailed link. */
export async function addPerson(
  member: CastMember,
  passwordHash: string,
  supplierId: string | null = null,
): Promise<Actor> {
  const { name, role } = cast[member];
  const email = emailOf(member);
  return act(system, 'person.add_demo', async (transaction) => {
    const person = await Person.create(
      { name, email, role, supplierId, passwordHash, state: 'active' },
      { transaction },
    );
    const actor: Actor = { kind: 'person', id: person.id, name, role, supplierId, address: '' };
    return {
      result: actor,
      entry: {
        recordType: 'person',
        recordId: person.id,
        after: { role, supplierId, state: 'active' },
        personal: { after: { name, email } },
      },
    };
  });
}

/** All demo accounts share one passphrase; a new one ends their sessions. */
export async function setDemoPassphrase(passphrase: string): Promise<void> {
  const passwordHash = await hashPassword(passphrase);
  for (const member of Object.keys(cast)) {
    await act(system, 'person.set_demo_passphrase', async (transaction) => {
      const person = await Person.findOne({ where: { email: emailOf(member) }, transaction });
      if (person)
        await person.update(
          { passwordHash, sessionEpoch: person.sessionEpoch + 1 },
          { transaction },
        );
      return { result: undefined, entry: { recordType: 'person', recordId: person?.id ?? member } };
    });
  }
}
