import { InvitePerson, type Person } from '@shared/contract/people';
import { type Role } from '@shared/contract/common';
import { fieldsOfIssues } from '@/components/criteria/form-values';

export interface PersonValues {
  name: string;
  email: string;
  role: Role;
  supplierId: string;
}

export const personValues = (person?: Person): PersonValues => ({
  name: person?.name ?? '',
  email: person?.email ?? '',
  role: person?.role ?? 'technician',
  supplierId: person?.supplier?.id ?? '',
});

/** As the contract takes it: only a supplier contact is bound to a supplier. */
export const personFields = ({ supplierId, ...values }: PersonValues) => ({
  ...values,
  supplierId: values.role === 'supplier_contact' && supplierId !== '' ? supplierId : null,
});

type Translate = (key: string, values?: Record<string, unknown>) => string;

export const personErrors = (values: PersonValues, t: Translate): Record<string, string> => ({
  ...fieldsOfIssues(InvitePerson.safeParse(personFields(values)).error?.issues ?? [], t),
  // The contract tells this last, when all else is right; a form tells it with the rest.
  ...(values.role === 'supplier_contact' &&
    values.supplierId === '' && { supplierId: t('people.supplierNeeded') }),
});
