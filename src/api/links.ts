import { type AnswerOf, type BodyInput } from '@shared/contract/endpoint';
import type * as contract from '@shared/contract/session';
import { api } from './client';

export type LinkInfo = AnswerOf<typeof contract.readLink>;

// By path, not by declaration: what is loaded before signing in stays small without the schemas.
export const requestReset = (email: string) =>
  api.post('/api/password/reset-requests', { email }, { expectsSignedOut: true });

export const readLink = (token: string, signal?: AbortSignal) =>
  api.get<LinkInfo>(`/api/links/${encodeURIComponent(token)}`, { signal, expectsSignedOut: true });

export const useLink = (token: string, body: BodyInput<typeof contract.useLink>) =>
  api.post(`/api/links/${encodeURIComponent(token)}`, body, { expectsSignedOut: true });
