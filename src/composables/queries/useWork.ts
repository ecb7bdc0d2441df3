import { useQuery } from '@tanstack/vue-query';
import { readWork } from '@/api/work';

/** What waits for the person who is signed in; looked at again every minute while the page is in view. */
export function useWork() {
  return useQuery({
    queryKey: ['work'],
    queryFn: ({ signal }) => readWork(signal),
    refetchInterval: 60_000,
  });
}
