import { type CurrentPerson } from '@shared/contract/session';
import { type Person } from '../models';

/** Expects `supplier` loaded. */
export function presentCurrentPerson(person: Person, sessionEndsAt: Date): CurrentPerson {
  return {
    id: person.id,
    name: person.name,
    email: person.email,
    role: person.role,
    supplier: person.supplier ? { id: person.supplier.id, name: person.supplier.name } : null,
    mailChoice: person.mailChoice,
    sessionEndsAt: sessionEndsAt.toISOString(),
  };
}
