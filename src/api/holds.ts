import * as contract from '@shared/contract/holds';
import { type BodyInput, type QueryInput } from '@shared/contract/endpoint';
import { addressOf, call } from './call';

export type { Hold, HoldRow } from '@shared/contract/holds';
export type HoldMessage = contract.Hold['messages'][number];
export type HoldQuery = Partial<QueryInput<typeof contract.listHolds>>;

export const listHolds = (query: HoldQuery, signal?: AbortSignal) =>
  call(contract.listHolds, { query, signal });

export const readHold = (id: string, signal?: AbortSignal) =>
  call(contract.readHold, { params: { id }, signal, isBackground: true });

export const acknowledgeHold = (id: string, note: string) =>
  call(contract.acknowledgeHold, { params: { id }, body: { note } });

export const answerHold = (
  id: string,
  answer: BodyInput<typeof contract.answerHold>,
  files: readonly File[],
) => call(contract.answerHold, { params: { id }, form: formOf({ ...answer }, files) });

export const writeToHold = (id: string, text: string, files: readonly File[]) =>
  call(contract.askHold, { params: { id }, form: formOf({ text }, files) });

export const attachmentAddress = (id: string, attachmentId: string) =>
  addressOf(contract.downloadAttachment, { params: { id, attachmentId } });

function formOf(texts: Record<string, string | undefined>, files: readonly File[]): FormData {
  const form = new FormData();
  for (const [name, text] of Object.entries(texts)) form.append(name, text ?? '');
  for (const file of files) form.append('files', file, file.name);
  return form;
}
