import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import {
  keepPreviousData,
  useInfiniteQuery,
  useMutation,
  useQuery,
  useQueryClient,
} from '@tanstack/vue-query';
import {
  lastVerification,
  listActs,
  listCheckpoints,
  listHistory,
  makeCheckpoint,
  readRecordAt,
  type HistoryQuery,
} from '@/api/history';

export function useHistoryList(query: MaybeRefOrGetter<HistoryQuery>) {
  return useQuery({
    queryKey: computed(() => ['history', 'list', toValue(query)]),
    queryFn: ({ signal }) => listHistory(toValue(query), signal),
    placeholderData: keepPreviousData,
  });
}

/** People, acts and kinds of record that occur, for the filters. */
export function useHistoryActs() {
  return useQuery({
    queryKey: ['history', 'acts'],
    queryFn: ({ signal }) => listActs(signal),
    staleTime: 60_000,
  });
}

/** One sealed entry; null when there is none of this number. It never changes. */
export function useHistoryEntry(sequence: MaybeRefOrGetter<number>) {
  return useQuery({
    queryKey: computed(() => ['history', 'entry', toValue(sequence)]),
    queryFn: async ({ signal }) =>
      (await listHistory({ sequence: toValue(sequence), limit: 1 }, signal)).items[0] ?? null,
    staleTime: 60_000,
  });
}

export interface RecordKey {
  recordType: string;
  recordId: string;
}

export function useRecordAt(
  record: MaybeRefOrGetter<RecordKey>,
  sequence: MaybeRefOrGetter<number | undefined>,
) {
  return useQuery({
    queryKey: computed(() => ['history', 'record', toValue(record), toValue(sequence) ?? 'now']),
    queryFn: ({ signal }) => {
      const { recordType, recordId } = toValue(record);
      return readRecordAt(recordType, recordId, toValue(sequence), signal);
    },
    placeholderData: keepPreviousData,
  });
}

export function useLastVerification() {
  return useQuery({
    queryKey: ['history', 'verification'],
    queryFn: ({ signal }) => lastVerification(signal),
  });
}

export function useCheckpoints() {
  return useInfiniteQuery({
    queryKey: ['history', 'checkpoints'],
    queryFn: ({ pageParam, signal }) => listCheckpoints(pageParam, signal),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.next ?? undefined,
  });
}

export function useMakeCheckpoint() {
  const queries = useQueryClient();
  return useMutation({
    mutationFn: makeCheckpoint,
    onSuccess: () => queries.invalidateQueries({ queryKey: ['history'] }),
  });
}
