import * as contract from '@shared/contract/dispositions';
import { type BodyInput } from '@shared/contract/endpoint';
import { addressOf, call } from './call';

export type { Disposition, Decision } from '@shared/contract/dispositions';

export const listDispositions = (lotId: string, signal?: AbortSignal) =>
  call(contract.listDispositions, { params: { id: lotId }, signal });

export const signDisposition = (lotId: string, body: BodyInput<typeof contract.signDisposition>) =>
  call(contract.signDisposition, { params: { id: lotId }, body });

export const countersign = (id: string, body: BodyInput<typeof contract.countersignDisposition>) =>
  call(contract.countersignDisposition, { params: { id }, body });

export const refuseSecond = (id: string, reason: string) =>
  call(contract.refuseDisposition, { params: { id }, body: { reason } });

export function addCustomerApproval(id: string, files: readonly File[]) {
  const form = new FormData();
  for (const file of files) form.append('files', file, file.name);
  return call(contract.addCustomerApproval, { params: { id }, form });
}

export const customerApprovalAddress = (id: string, fileId: string) =>
  addressOf(contract.downloadCustomerApproval, { params: { id, fileId } });

export const proposeContainment = (lotId: string, signal?: AbortSignal) =>
  call(contract.proposeContainment, { params: { id: lotId }, signal });

export const sortLot = (lotId: string, body: BodyInput<typeof contract.sortLot>) =>
  call(contract.sortLot, { params: { id: lotId }, body });

export const certificateAddress = (lotId: string, dispositionId?: string) =>
  addressOf(contract.readCertificate, { params: { id: lotId }, query: { dispositionId } });
