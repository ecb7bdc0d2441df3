import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { useQuery } from '@tanstack/vue-query';
import * as contract from '@shared/contract/parts';
import { call } from '@/api/call';

/** A part with all its revisions, for comparing the one a lot is judged by with a newer one. */
export function usePartWithRevisions(
  partId: MaybeRefOrGetter<string>,
  enabled: MaybeRefOrGetter<boolean>,
) {
  return useQuery({
    queryKey: computed(() => ['parts', 'one', toValue(partId)]),
    queryFn: ({ signal }) => call(contract.readPart, { params: { id: toValue(partId) }, signal }),
    enabled: computed(() => toValue(enabled)),
  });
}
