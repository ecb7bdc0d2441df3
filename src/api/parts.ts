import * as contract from '@shared/contract/parts';
import { type BodyInput, type QueryInput } from '@shared/contract/endpoint';
import { call } from './call';

export type { Part, PartCriteria, PartRevision, PartWithRevisions } from '@shared/contract/parts';
export type PartQuery = Partial<QueryInput<typeof contract.listParts>>;
export type AddPart = BodyInput<typeof contract.addPart>;
export type ChangePart = BodyInput<typeof contract.changePart>;
export type DraftPartRevision = BodyInput<typeof contract.addPartRevision>;
export type ChangePartRevision = BodyInput<typeof contract.changePartRevision>;
export type ApprovePartRevision = BodyInput<typeof contract.approvePartRevision>;

export const listParts = (query: PartQuery, signal?: AbortSignal) =>
  call(contract.listParts, { query, signal });

export const readPart = (id: string, signal?: AbortSignal) =>
  call(contract.readPart, { params: { id }, signal });

export const addPart = (body: AddPart) => call(contract.addPart, { body });

export const changePart = (id: string, body: ChangePart) =>
  call(contract.changePart, { params: { id }, body });

export const draftPartRevision = (id: string, body: DraftPartRevision) =>
  call(contract.addPartRevision, { params: { id }, body });

export const changePartRevision = (id: string, revisionId: string, body: ChangePartRevision) =>
  call(contract.changePartRevision, { params: { id, revisionId }, body });

export const approvePartRevision = (id: string, revisionId: string, body: ApprovePartRevision) =>
  call(contract.approvePartRevision, { params: { id, revisionId }, body });
