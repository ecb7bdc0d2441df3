import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { useInfiniteQuery } from '@tanstack/vue-query';
import { readLotHistory } from '@/api/lots';
import { lotKey } from './useLot';

/** What happened to a lot, newest first, page by page. */
export function useLotHistory(lotId: MaybeRefOrGetter<string>) {
  return useInfiniteQuery({
    queryKey: computed(() => [...lotKey(toValue(lotId)), 'history']),
    queryFn: ({ pageParam, signal }) => readLotHistory(toValue(lotId), pageParam, signal),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.next ?? undefined,
  });
}
