import { computed, type Ref } from 'vue';
import { refDebounced } from '@vueuse/core';
import { useQuery } from '@tanstack/vue-query';
import { type z } from 'zod';
import { type FindHit } from '@shared/contract/work';
import { api } from '@/api/client';

export type Hit = z.infer<typeof FindHit>;

/** Asks for lots, parts and serial numbers once one pauses in typing. */
export function useFind(text: Readonly<Ref<string>>) {
  const settled = refDebounced(
    computed(() => text.value.trim()),
    150,
  );
  const isWorthAsking = computed(() => settled.value.length >= 2);
  const query = useQuery({
    queryKey: ['find', settled],
    queryFn: ({ signal }) =>
      api.get<{ items: Hit[] }>('/api/find', { query: { find: settled.value }, signal }),
    enabled: isWorthAsking,
    staleTime: 30_000,
  });
  const isAnswered = computed(
    () => isWorthAsking.value && query.isSuccess.value && text.value.trim() === settled.value,
  );
  // Never hits of an earlier text: Enter would go where nobody wanted to.
  const hits = computed(() => (isAnswered.value ? (query.data.value?.items ?? []) : []));
  return { hits, isAsking: query.isFetching, failed: query.isError, isAnswered };
}
