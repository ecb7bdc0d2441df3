import { type z } from 'zod';
import { type Checkpoint } from '@shared/contract/history';
import { type HistoryCheckpoint } from '../models';

export function presentCheckpoint({
  id,
  count,
  head,
  at,
  signature,
  publicKey,
}: HistoryCheckpoint): z.infer<typeof Checkpoint> {
  return { id, count: Number(count), head, at: at.toISOString(), signature, publicKey };
}
