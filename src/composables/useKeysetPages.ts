import { computed, ref, watch, type Ref } from 'vue';
import { useRoute, useRouter } from 'vue-router';

/**
 * Pages of a list that the server hands out by cursor, held in the address (`after`, `page`), so that a link shows this
 * very page. Going back works by the cursors met on the way; a page opened by link can go back to the first only.
 * `filters` is watched: another filter starts again at the first page.
 */
export function useKeysetPages(filters: Readonly<Ref<unknown>>, limit = 50) {
  const route = useRoute();
  const router = useRouter();
  const after = computed(() => (typeof route.query.after === 'string' ? route.query.after : ''));
  const page = computed(() => Math.max(1, Math.floor(Number(route.query.page)) || 1));
  const from = computed(() => (page.value - 1) * limit + 1);
  /** Cursor of each page met so far, by its number; the first page has none. */
  const met = ref(new Map<number, string>([[1, '']]));

  watch(
    () => JSON.stringify(filters.value),
    () => {
      met.value = new Map([[1, '']]);
      if (after.value !== '') void go(1, '');
    },
  );

  async function go(number: number, cursor: string): Promise<void> {
    const query = { ...route.query };
    delete query.after;
    delete query.page;
    if (number > 1) Object.assign(query, { after: cursor, page: String(number) });
    await router.push({ query, hash: route.hash });
    window.scrollTo({ top: 0 });
  }

  return {
    after,
    from,
    limit,
    first: () => go(1, ''),
    previous: () => {
      const cursor = met.value.get(page.value - 1);
      return cursor === undefined ? go(1, '') : go(page.value - 1, cursor);
    },
    next: (cursor: string) => {
      met.value.set(page.value, after.value);
      met.value.set(page.value + 1, cursor);
      return go(page.value + 1, cursor);
    },
  };
}
