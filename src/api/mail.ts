import * as contract from '@shared/contract/mail';
import { type AnswerOf, type QueryInput } from '@shared/contract/endpoint';
import { call } from './call';

export type { MailRow } from '@shared/contract/mail';
export type Mail = AnswerOf<typeof contract.readMail>;
export type MailQuery = Partial<QueryInput<typeof contract.listMail>>;

export const listMail = (query: MailQuery, signal?: AbortSignal) =>
  call(contract.listMail, { query, signal });

export const readMail = (id: string, signal?: AbortSignal) =>
  call(contract.readMail, { params: { id }, signal, isBackground: true });

export const resendMail = (id: string) => call(contract.resendMail, { params: { id }, body: {} });
