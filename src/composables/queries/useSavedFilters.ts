import { useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import { deleteFilter, listFilters, saveFilter } from '@/api/preferences';

/** Filters of one list that a person keeps, and those others of the same role share. */
export function useSavedFilters(list: string) {
  return useQuery({
    queryKey: ['saved-filters', list],
    queryFn: ({ signal }) => listFilters(list, signal),
    staleTime: 60_000,
  });
}

export function useSavedFilterActs(list: string) {
  const queries = useQueryClient();
  const onSuccess = () => queries.invalidateQueries({ queryKey: ['saved-filters', list] });
  const save = useMutation({
    mutationFn: (filter: { name: string; query: string; sharedWithRole: boolean }) =>
      saveFilter({ list, ...filter }),
    onSuccess,
  });
  const remove = useMutation({ mutationFn: deleteFilter, onSuccess });
  return { save, remove };
}
