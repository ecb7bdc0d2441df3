import { computed } from 'vue';
import { useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import { readPreferences, setTablePreference } from '@/api/preferences';
import { useSession } from '@/stores/session';

type Kept = Awaited<ReturnType<typeof readPreferences>>;

/**
 * Which columns the person who is signed in sees in which table, kept on the server. A column's key stands for a shown
 * one, with a minus before it for a hidden one; a column that is in neither way on record is as the table begins.
 */
export function useTablePreferences() {
  const session = useSession();
  const queries = useQueryClient();
  const queryKey = computed(() => ['preferences', session.person?.id ?? '']);
  const query = useQuery({
    queryKey,
    queryFn: ({ signal }) => readPreferences(signal),
    enabled: computed(() => session.person !== null),
    staleTime: Infinity,
  });
  const change = useMutation({
    mutationFn: ({ table, columns }: { table: string; columns: string[] }) =>
      session.person === null ? Promise.resolve(null) : setTablePreference(table, columns),
    // A click on a column is answered at once; should the server refuse it, what it has on record shows again.
    onMutate: ({ table, columns }) => {
      queries.setQueryData<Kept>(queryKey.value, (kept) => ({
        tables: { ...kept?.tables, [table]: { columns } },
      }));
    },
    onError: () => queries.invalidateQueries({ queryKey: queryKey.value }),
  });
  return {
    columnsOf: (table: string) => query.data.value?.tables[table]?.columns ?? null,
    set: (table: string, columns: string[]) => change.mutate({ table, columns }),
  };
}
