import { toValue, watchEffect, type MaybeRefOrGetter } from 'vue';
import { useRoute } from 'vue-router';

/** Names the window after the record once it is known: 'L-2611-084 · Quartzhold'. */
export function useTitle(name: MaybeRefOrGetter<string | undefined>): void {
  const route = useRoute();
  const at = route.path;
  watchEffect(() => {
    const known = toValue(name);
    if (known && route.path === at) document.title = `${known} · Quartzhold`;
  });
}
