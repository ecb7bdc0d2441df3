import * as contract from '@shared/contract/session';
import { type BodyInput } from '@shared/contract/endpoint';
import { call } from './call';

export const listSessions = (signal?: AbortSignal) => call(contract.listSessions, { signal });

/** `others` ends all but this one. */
export const endSession = (id: string) => call(contract.endSession, { params: { id } });

export const changePassword = (body: BodyInput<typeof contract.changePassword>) =>
  call(contract.changePassword, { body });

export const setMailChoice = (body: BodyInput<typeof contract.setMailChoice>) =>
  call(contract.setMailChoice, { body });

/** When the session really ends, asked without moving its end; a refusal says that it has ended. */
export const lookAtSession = () => call(contract.currentSession, { isBackground: true });
