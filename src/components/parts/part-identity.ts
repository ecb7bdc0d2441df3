import { PartFields, type DeviceKind, type Part } from '@shared/contract/parts';
import { fieldsOfIssues } from '@/components/criteria/form-values';

export interface PartIdentity {
  partNumber: string;
  deviceKind: DeviceKind;
  description: string;
  active: boolean;
  receivers: { id: string; label: string }[];
}

export const emptyIdentity: PartIdentity = {
  partNumber: '',
  deviceKind: 'crystal',
  description: '',
  active: true,
  receivers: [],
};

export const identityOf = (part: Part): PartIdentity => ({
  partNumber: part.partNumber,
  deviceKind: part.deviceKind,
  description: part.description,
  active: part.active,
  receivers: part.receivers.map(({ id, name }) => ({ id, label: name })),
});

/** As the contract takes it. */
export const identityFields = ({ receivers, ...fields }: PartIdentity) => ({
  ...fields,
  receiverIds: receivers.map(({ id }) => id),
});

type Translate = (key: string, values?: Record<string, unknown>) => string;

export const identityErrors = (identity: PartIdentity, t: Translate) =>
  fieldsOfIssues(PartFields.safeParse(identityFields(identity)).error?.issues ?? [], t);
