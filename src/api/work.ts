import * as contract from '@shared/contract/work';
import { call } from './call';

export type { MyWork } from '@shared/contract/work';
export type WorkSection = contract.MyWork['sections'][number];

/** Asked by a clock every minute, so it never keeps a session alive. */
export const readWork = (signal?: AbortSignal) =>
  call(contract.readWork, { signal, isBackground: true });
