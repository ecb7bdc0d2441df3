import { computed, ref, toValue, watch, type MaybeRefOrGetter } from 'vue';

const windowMs = 5000;

/** Rate over the last seconds, and the time left at that rate; both null until the second report of progress. */
export function useProgressRate(
  done: MaybeRefOrGetter<number>,
  total: MaybeRefOrGetter<number | null>,
  now: () => number = () => performance.now(),
) {
  const samples = ref<{ atMs: number; done: number }[]>([{ atMs: now(), done: toValue(done) }]);

  watch(
    () => toValue(done),
    (value, before) => {
      const atMs = now();
      const kept =
        value < before ? [] : samples.value.filter((sample) => atMs - sample.atMs <= windowMs);
      samples.value = [...kept, { atMs, done: value }];
    },
    { flush: 'sync' },
  );

  const perSecond = computed(() => {
    const first = samples.value[0];
    const last = samples.value.at(-1);
    if (!first || !last || last.atMs <= first.atMs) return null;
    return (1000 * (last.done - first.done)) / (last.atMs - first.atMs);
  });

  const secondsLeft = computed(() => {
    const all = toValue(total);
    if (all === null || perSecond.value === null || perSecond.value <= 0) return null;
    return Math.max(0, all - toValue(done)) / perSecond.value;
  });

  return { perSecond, secondsLeft };
}
