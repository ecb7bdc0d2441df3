import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import {
  addSupplier,
  changeSupplier,
  listSuppliers,
  readSupplier,
  type ChangeSupplier,
  type Supplier,
  type SupplierQuery,
} from '@/api/suppliers';

export function useSuppliers(query: MaybeRefOrGetter<SupplierQuery>) {
  return useQuery({
    queryKey: computed(() => ['suppliers', 'list', toValue(query)]),
    queryFn: ({ signal }) => listSuppliers(toValue(query), signal),
    placeholderData: keepPreviousData,
  });
}

export function useSupplier(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => ['suppliers', 'one', toValue(id)]),
    queryFn: ({ signal }) => readSupplier(toValue(id), signal),
    enabled: computed(() => toValue(id) !== ''),
  });
}

export function useSupplierActs() {
  const queries = useQueryClient();
  const onSuccess = (supplier: Supplier) => {
    queries.setQueryData(['suppliers', 'one', supplier.id], supplier);
    for (const queryKey of [['suppliers', 'list'], ['lots'], ['holds'], ['people'], ['history']])
      void queries.invalidateQueries({ queryKey });
  };
  const add = useMutation({ mutationFn: addSupplier, onSuccess });
  const change = useMutation({
    mutationFn: ({ id, ...body }: ChangeSupplier & { id: string }) => changeSupplier(id, body),
    onSuccess,
  });
  return { add, change };
}
