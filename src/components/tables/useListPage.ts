import { computed, watch, type ComputedRef, type Ref } from 'vue';
import { useI18n } from 'vue-i18n';
import { useAnnouncer } from '@/composables/useAnnouncer';
import { useKeysetPages } from '@/composables/useKeysetPages';

interface Answer<Row> {
  items: Row[];
  next: string | null;
}

/** As vue-query hands out a list. */
interface ListQuery<Row> {
  data: Ref<Answer<Row> | undefined>;
  error: Ref<unknown>;
  isFetching: Ref<boolean>;
  isPlaceholderData: Ref<boolean>;
  isPending: Ref<boolean>;
  refetch: () => unknown;
}

/** One page of a list that the server hands out by cursor: rows, where one is, and a sentence that tells it, also aloud. */
export function useListPage<Row, Filter extends object>(
  filter: Readonly<Ref<Filter>>,
  ask: (
    query: ComputedRef<Filter & { after: string | undefined; limit: number }>,
  ) => ListQuery<Row>,
) {
  const { t } = useI18n();
  const { announce } = useAnnouncer();
  const pages = useKeysetPages(filter);
  const list = ask(
    computed(() => ({
      ...filter.value,
      after: pages.after.value || undefined,
      limit: pages.limit,
    })),
  );
  const rows = computed<Row[]>(() => list.data.value?.items ?? []);
  const next = computed(() => list.data.value?.next ?? null);
  const told = computed(() => {
    if (!list.data.value) return '';
    const count = rows.value.length;
    return next.value === null ? t('list.found', { count }, count) : t('list.foundMore', { count });
  });

  watch(list.data, (now, before) => {
    if (now && before && !list.isPlaceholderData.value) void announce(told.value);
  });

  return {
    rows,
    next,
    told,
    pages,
    isLoading: computed(
      () => list.isPending.value || (list.isFetching.value && list.isPlaceholderData.value),
    ),
    error: list.error,
    again: () => void list.refetch(),
    forward: () => {
      if (next.value !== null) void pages.next(next.value);
    },
  };
}
