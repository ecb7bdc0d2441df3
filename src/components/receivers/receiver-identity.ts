import { z } from 'zod';
import { OptionalShortText, ShortText } from '@shared/contract/common';
import { type Receiver } from '@shared/contract/receivers';
import { fieldsOfIssues } from '@/components/criteria/form-values';

export interface ReceiverIdentity {
  name: string;
  description: string;
  active: boolean;
  parts: { id: string; label: string }[];
}

export const emptyIdentity: ReceiverIdentity = {
  name: '',
  description: '',
  active: true,
  parts: [],
};

export const identityOf = (receiver: Receiver): ReceiverIdentity => ({
  name: receiver.name,
  description: receiver.description,
  active: receiver.active,
  parts: receiver.parts.map(({ id, partNumber }) => ({ id, label: partNumber })),
});

/** As the contract takes it. */
export const identityFields = ({ parts, ...fields }: ReceiverIdentity) => ({
  ...fields,
  partIds: parts.map(({ id }) => id),
});

const schema = z.object({ name: ShortText, description: OptionalShortText });
type Translate = (key: string, values?: Record<string, unknown>) => string;

export const identityErrors = ({ name, description }: ReceiverIdentity, t: Translate) =>
  fieldsOfIssues(schema.safeParse({ name, description }).error?.issues ?? [], t);
