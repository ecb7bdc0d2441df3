import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import { listLots, registerLot, type LotQuery } from '@/api/lots';

export function useLots(query: MaybeRefOrGetter<Partial<LotQuery>>) {
  return useQuery({
    queryKey: computed(() => ['lots', 'list', toValue(query)]),
    queryFn: ({ signal }) => listLots(toValue(query), signal),
    placeholderData: keepPreviousData,
  });
}

export function useRegisterLot() {
  const queries = useQueryClient();
  return useMutation({
    mutationFn: registerLot,
    onSuccess: () => {
      for (const queryKey of [['lots'], ['work'], ['parts'], ['suppliers'], ['history']])
        void queries.invalidateQueries({ queryKey });
    },
  });
}
