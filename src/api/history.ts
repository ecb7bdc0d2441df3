import * as contract from '@shared/contract/history';
import { type QueryInput } from '@shared/contract/endpoint';
import { addressOf, call, pathOf } from './call';

export type { HistoryEntry, Verification } from '@shared/contract/history';
export type HistoryFilter = QueryInput<typeof contract.exportHistory>;
export type HistoryQuery = Partial<QueryInput<typeof contract.listHistory>>;

export const listHistory = (query: HistoryQuery, signal?: AbortSignal) =>
  call(contract.listHistory, { query, signal });

export const listActs = (signal?: AbortSignal) => call(contract.listActs, { signal });

export const readRecordAt = (
  recordType: string,
  recordId: string,
  sequence: number | undefined,
  signal?: AbortSignal,
) => call(contract.readRecordAt, { params: { recordType, recordId }, query: { sequence }, signal });

export const lastVerification = (signal?: AbortSignal) =>
  call(contract.lastVerification, { signal });

export const listCheckpoints = (after: string | undefined, signal?: AbortSignal) =>
  call(contract.listCheckpoints, { query: { after, limit: 50 }, signal });

export const makeCheckpoint = () => call(contract.makeCheckpoint, { body: {} });

export const verificationEventsAddress = () => pathOf(contract.streamVerification);
export const verifierAddress = () => pathOf(contract.readVerifier);
export const exportAddress = (query: HistoryFilter) => addressOf(contract.exportHistory, { query });
export const csvAddress = (query: HistoryFilter) => addressOf(contract.exportHistoryCsv, { query });
