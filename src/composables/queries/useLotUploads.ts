import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { useInfiniteQuery, useMutation, useQuery } from '@tanstack/vue-query';
import { clearWarnings, listUploads, previewWithdrawal, withdrawUpload } from '@/api/uploads';
import { lotKey, useRefreshLot } from './useLot';

/** Uploads of a lot, newest first; asked for again while one is being read. */
export function useLotUploads(lotId: MaybeRefOrGetter<string>) {
  return useInfiniteQuery({
    queryKey: computed(() => [...lotKey(toValue(lotId)), 'uploads']),
    queryFn: ({ pageParam, signal }) => listUploads(toValue(lotId), pageParam, signal),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.next ?? undefined,
    refetchInterval: ({ state }) =>
      state.data?.pages.some((page) =>
        page.items.some((upload) => upload.state === 'queued' || upload.state === 'running'),
      )
        ? 1500
        : false,
  });
}

export function useWithdrawalPreview(uploadId: MaybeRefOrGetter<string | null>) {
  return useQuery({
    queryKey: computed(() => ['uploads', toValue(uploadId), 'withdrawal']),
    queryFn: ({ signal }) => previewWithdrawal(toValue(uploadId)!, signal),
    enabled: computed(() => toValue(uploadId) !== null),
    staleTime: 0,
  });
}

export function useUploadActs(lotId: MaybeRefOrGetter<string>) {
  const onSuccess = useRefreshLot(lotId);
  const withdraw = useMutation({
    mutationFn: ({ id, reason }: { id: string; reason: string }) => withdrawUpload(id, reason),
    onSuccess,
  });
  const clear = useMutation({
    mutationFn: ({ id, reason }: { id: string; reason: string }) => clearWarnings(id, reason),
    onSuccess,
  });
  return { withdraw, clear };
}
