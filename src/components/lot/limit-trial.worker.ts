import { tryLimits } from '@shared/analysis/what-if';
import { type LimitAnswer, type LimitQuestion } from './limit-worker';

let offsets = new Float64Array();

/** Keeps a lot's sorted offsets and answers what given limits would mean. */
self.onmessage = ({ data }: MessageEvent<LimitQuestion>) => {
  if (data.kind === 'offsets') {
    offsets = data.offsets as Float64Array<ArrayBuffer>;
    return;
  }
  let answer: LimitAnswer;
  try {
    answer = { ok: true, outcome: tryLimits(offsets, data.limits) };
  } catch (error) {
    answer = { ok: false, message: error instanceof Error ? error.message : String(error) };
  }
  self.postMessage(answer);
};
