import * as contract from '@shared/contract/uploads';
import { addressOf, call } from './call';

export type { Upload } from '@shared/contract/uploads';

export const listUploads = (lotId: string, after?: string, signal?: AbortSignal) =>
  call(contract.listUploads, { params: { id: lotId }, query: { after }, signal });

export const readUpload = (id: string, signal?: AbortSignal) =>
  call(contract.readUpload, { params: { id }, signal });

export const previewWithdrawal = (id: string, signal?: AbortSignal) =>
  call(contract.previewWithdrawal, { params: { id }, signal });

export const withdrawUpload = (id: string, reason: string) =>
  call(contract.withdrawUpload, { params: { id }, body: { reason } });

export const clearWarnings = (id: string, reason: string) =>
  call(contract.clearWarnings, { params: { id }, body: { reason } });

export const refusedCsvAddress = (id: string) =>
  addressOf(contract.exportRefusedRows, { params: { id } });

export const originalAddress = (id: string) =>
  addressOf(contract.downloadOriginal, { params: { id } });
