import { computed, onScopeDispose, ref, shallowRef, toValue, type MaybeRefOrGetter } from 'vue';
import { tryLimits, type WhatIf } from '@shared/analysis/what-if';
import { type Analysis } from '@shared/contract/analysis';
import { readOffsets } from '@/api/analysis';
import { LimitWorker } from './limit-worker';

/** Above this many units the page would stutter while a limit is dragged, so a worker computes. */
export const WORKER_FROM_UNITS = 100_000;

export type LimitTrial = ReturnType<typeof useLimitTrial>;

/**
 * Other limits tried on a lot: nothing is saved. The readings are fetched at the first touch, once an analysis; `outcome`
 * is what the limits being tried would give, null until it is known.
 */
export function useLimitTrial(analysis: MaybeRefOrGetter<Analysis>) {
  const set = () => toValue(analysis).limits;
  const lowPpm = ref(set().lowPpm);
  const highPpm = ref(set().highPpm);
  const outcome = shallowRef<WhatIf | null>(null);
  const error = ref<unknown>(null);
  const isFetching = ref(false);
  const isOn = ref(false);
  let fetched: { id: string; compute: (limits: Limits) => Promise<WhatIf> | WhatIf } | null = null;
  let fetching: AbortController | null = null;
  let worker: LimitWorker | null = null;
  let latest = 0;

  const isCrossed = computed(
    () => lowPpm.value !== null && highPpm.value !== null && lowPpm.value >= highPpm.value,
  );
  const isMissing = computed(() => lowPpm.value === null && highPpm.value === null);

  function tried(which: typeof lowPpm) {
    return computed({
      get: () => which.value,
      set: (value: number | null) => {
        if (value === which.value) return;
        which.value = value;
        isOn.value = true;
        void recompute();
      },
    });
  }

  /** Fetches the readings if that has not happened yet. */
  async function start(): Promise<void> {
    const { id, units } = toValue(analysis);
    if (fetched?.id === id || isFetching.value) return;
    error.value = null;
    isFetching.value = true;
    fetching = new AbortController();
    try {
      const offsets = await readOffsets(id, fetching.signal);
      worker?.stop();
      worker = units > WORKER_FROM_UNITS ? new LimitWorker(offsets) : null;
      const compute = worker
        ? (limits: Limits) => worker!.compute(limits)
        : (limits: Limits) => tryLimits(offsets, limits);
      fetched = { id, compute };
    } catch (thrown) {
      if (!(thrown instanceof DOMException)) error.value = thrown;
    } finally {
      isFetching.value = false;
    }
    if (isOn.value) await recompute();
  }

  async function recompute(): Promise<void> {
    const asked = ++latest;
    if (isCrossed.value || isMissing.value) {
      outcome.value = null;
      return;
    }
    if (fetched?.id !== toValue(analysis).id) return start();
    try {
      const result = await fetched.compute({ lowPpm: lowPpm.value, highPpm: highPpm.value });
      if (asked === latest && isOn.value) outcome.value = result;
    } catch (thrown) {
      error.value = thrown;
    }
  }

  function reset(): void {
    latest += 1;
    isOn.value = false;
    outcome.value = null;
    error.value = null;
    lowPpm.value = set().lowPpm;
    highPpm.value = set().highPpm;
  }

  onScopeDispose(() => {
    fetching?.abort();
    worker?.stop();
  });

  return {
    low: tried(lowPpm),
    high: tried(highPpm),
    outcome,
    error,
    isFetching,
    isOn,
    isCrossed,
    isMissing,
    start,
    reset,
  };
}

interface Limits {
  lowPpm: number | null;
  highPpm: number | null;
}
