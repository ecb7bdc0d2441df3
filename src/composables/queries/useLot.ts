import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import { type BodyInput } from '@shared/contract/endpoint';
import type * as contract from '@shared/contract/lots';
import { changeLot, readLot, rejudgeLot } from '@/api/lots';

/** All that is kept of a lot stands under `['lots', 'one', id]`, so that one act can refresh it together. */
export const lotKey = (id: string) => ['lots', 'one', id] as const;

/** A lot, asked for again while its readings are being read or nothing is analysed yet. */
export function useLot(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => [...lotKey(toValue(id)), 'lot']),
    queryFn: ({ signal }) => readLot(toValue(id), signal),
    refetchInterval: ({ state }) =>
      state.data?.owed.some(({ kind }) => kind === 'uploads_running') ? 2000 : false,
  });
}

/** Whatever was done to a lot may show anywhere: in lists, on my work, in a hold. */
export function useRefreshLot(id: MaybeRefOrGetter<string>) {
  const queries = useQueryClient();
  return async () => {
    await queries.invalidateQueries({ queryKey: lotKey(toValue(id)) });
    for (const queryKey of [['lots'], ['work'], ['holds'], ['mail'], ['history']])
      void queries.invalidateQueries({
        queryKey,
        predicate: ({ queryKey: key }) => key[1] !== 'one' || key[2] !== toValue(id),
      });
  };
}

export function useChangeLot(id: MaybeRefOrGetter<string>) {
  return useMutation({
    mutationFn: (body: BodyInput<typeof contract.changeLot>) => changeLot(toValue(id), body),
    onSettled: useRefreshLot(id),
  });
}

export function useRejudgeLot(id: MaybeRefOrGetter<string>) {
  return useMutation({
    mutationFn: (body: BodyInput<typeof contract.rejudgeLot>) => rejudgeLot(toValue(id), body),
    onSuccess: useRefreshLot(id),
  });
}
