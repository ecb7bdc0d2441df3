import * as contract from '@shared/contract/people';
import { type BodyInput, type QueryInput } from '@shared/contract/endpoint';
import { call } from './call';

export type { Person } from '@shared/contract/people';
export type PeopleQuery = Partial<QueryInput<typeof contract.listPeople>>;
export type InvitePerson = BodyInput<typeof contract.invitePerson>;
export type ChangePerson = BodyInput<typeof contract.changePerson>;

export const listPeople = (query: PeopleQuery, signal?: AbortSignal) =>
  call(contract.listPeople, { query, signal });

export const readPerson = (id: string, signal?: AbortSignal) =>
  call(contract.readPerson, { params: { id }, signal });

export const invitePerson = (body: InvitePerson) => call(contract.invitePerson, { body });

export const changePerson = (id: string, body: ChangePerson) =>
  call(contract.changePerson, { params: { id }, body });

export const disablePerson = (id: string, reason: string) =>
  call(contract.disablePerson, { params: { id }, body: { reason } });

export const enablePerson = (id: string) => call(contract.enablePerson, { params: { id } });

export const sendPersonLink = (id: string) => call(contract.sendLink, { params: { id } });

export const unlockPerson = (id: string) => call(contract.unlockPerson, { params: { id } });

export const endPersonSessions = (id: string) =>
  call(contract.endPersonSessions, { params: { id } });
