import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { useQuery } from '@tanstack/vue-query';
import { listAnalyses, readAnalysis } from '@/api/analysis';
import { lotKey } from './useLot';

/** An analysis never changes; only which one is current does, and that is part of the key. */
export function useAnalysis(
  lotId: MaybeRefOrGetter<string>,
  analysisId: MaybeRefOrGetter<string | null>,
) {
  return useQuery({
    queryKey: computed(() => [...lotKey(toValue(lotId)), 'analysis', toValue(analysisId)]),
    queryFn: ({ signal }) => readAnalysis(toValue(lotId), toValue(analysisId) ?? undefined, signal),
    enabled: computed(() => toValue(analysisId) !== null),
    // Another version of the same lot may stay in view while the next one comes; another lot may not.
    placeholderData: (before) => (before?.lotId === toValue(lotId) ? before : undefined),
    staleTime: 60_000,
  });
}

export function useAnalyses(lotId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => [...lotKey(toValue(lotId)), 'analyses']),
    queryFn: ({ signal }) => listAnalyses(toValue(lotId), signal),
  });
}
