import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import {
  addBench,
  changeBench,
  issueBenchToken,
  listBenchTokens,
  listBenches,
  readBench,
  revokeBenchToken,
  type Bench,
  type BenchQuery,
  type ChangeBench,
} from '@/api/benches';

export function useBenches(query: MaybeRefOrGetter<BenchQuery>) {
  return useQuery({
    queryKey: computed(() => ['benches', 'list', toValue(query)]),
    queryFn: ({ signal }) => listBenches(toValue(query), signal),
    placeholderData: keepPreviousData,
  });
}

export function useBench(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => ['benches', 'one', toValue(id)]),
    queryFn: ({ signal }) => readBench(toValue(id), signal),
    enabled: computed(() => toValue(id) !== ''),
  });
}

export function useBenchActs() {
  const queries = useQueryClient();
  const onSuccess = (bench: Bench) => {
    queries.setQueryData(['benches', 'one', bench.id], bench);
    // Another bench may have stopped being the usual one by this.
    for (const queryKey of [['benches'], ['lots'], ['history']])
      void queries.invalidateQueries({ queryKey });
  };
  const add = useMutation({ mutationFn: addBench, onSuccess });
  const change = useMutation({
    mutationFn: ({ id, ...body }: ChangeBench & { id: string }) => changeBench(id, body),
    onSuccess,
  });
  return { add, change };
}

const tokensKey = (benchId: string) => ['benches', 'tokens', benchId];

export function useBenchTokens(benchId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => tokensKey(toValue(benchId))),
    queryFn: ({ signal }) => listBenchTokens(toValue(benchId), signal),
  });
}

export function useBenchTokenActs(benchId: MaybeRefOrGetter<string>) {
  const queries = useQueryClient();
  const onSuccess = () => queries.invalidateQueries({ queryKey: tokensKey(toValue(benchId)) });
  const issue = useMutation({
    mutationFn: (label: string) => issueBenchToken(toValue(benchId), label),
    // The answer holds the secret; nothing keeps it longer than the page that shows it.
    gcTime: 0,
    onSuccess,
  });
  const revoke = useMutation({
    mutationFn: (tokenId: string) => revokeBenchToken(toValue(benchId), tokenId),
    onSuccess,
  });
  return { issue, revoke };
}
