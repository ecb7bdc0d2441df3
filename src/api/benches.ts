import * as contract from '@shared/contract/benches';
import { type BodyInput, type QueryInput } from '@shared/contract/endpoint';
import { type z } from 'zod';
import { call } from './call';

export type { Bench } from '@shared/contract/benches';
export type BenchToken = z.infer<typeof contract.BenchToken>;
export type BenchQuery = Partial<QueryInput<typeof contract.listBenches>>;
export type AddBench = BodyInput<typeof contract.addBench>;
export type ChangeBench = BodyInput<typeof contract.changeBench>;

export const listBenches = (query: BenchQuery = {}, signal?: AbortSignal) =>
  call(contract.listBenches, { query, signal });

export const readBench = (id: string, signal?: AbortSignal) =>
  call(contract.readBench, { params: { id }, signal });

export const addBench = (body: AddBench) => call(contract.addBench, { body });

export const changeBench = (id: string, body: ChangeBench) =>
  call(contract.changeBench, { params: { id }, body });

export const listBenchTokens = (id: string, signal?: AbortSignal) =>
  call(contract.listBenchTokens, { params: { id }, signal });

/** The answer carries the secret, this once. */
export const issueBenchToken = (id: string, label: string) =>
  call(contract.issueBenchToken, { params: { id }, body: { label } });

export const revokeBenchToken = (id: string, tokenId: string) =>
  call(contract.revokeBenchToken, { params: { id, tokenId } });
