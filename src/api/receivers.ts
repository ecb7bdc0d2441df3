import * as contract from '@shared/contract/receivers';
import { type BodyInput, type QueryInput } from '@shared/contract/endpoint';
import { call } from './call';

export type {
  Receiver,
  ReceiverCriteria,
  ReceiverRevision,
  ReceiverWithRevisions,
} from '@shared/contract/receivers';
export type ReceiverQuery = Partial<QueryInput<typeof contract.listReceivers>>;
export type AddReceiver = BodyInput<typeof contract.addReceiver>;
export type ChangeReceiver = BodyInput<typeof contract.changeReceiver>;
export type DraftReceiverRevision = BodyInput<typeof contract.addReceiverRevision>;
export type ChangeReceiverRevision = BodyInput<typeof contract.changeReceiverRevision>;
export type ApproveReceiverRevision = BodyInput<typeof contract.approveReceiverRevision>;

export const listReceivers = (query: ReceiverQuery, signal?: AbortSignal) =>
  call(contract.listReceivers, { query, signal });

export const readReceiver = (id: string, signal?: AbortSignal) =>
  call(contract.readReceiver, { params: { id }, signal });

export const addReceiver = (body: AddReceiver) => call(contract.addReceiver, { body });

export const changeReceiver = (id: string, body: ChangeReceiver) =>
  call(contract.changeReceiver, { params: { id }, body });

export const draftReceiverRevision = (id: string, body: DraftReceiverRevision) =>
  call(contract.addReceiverRevision, { params: { id }, body });

export const changeReceiverRevision = (
  id: string,
  revisionId: string,
  body: ChangeReceiverRevision,
) => call(contract.changeReceiverRevision, { params: { id, revisionId }, body });

export const approveReceiverRevision = (
  id: string,
  revisionId: string,
  body: ApproveReceiverRevision,
) => call(contract.approveReceiverRevision, { params: { id, revisionId }, body });
