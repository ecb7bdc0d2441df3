import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { useMutation, useQuery } from '@tanstack/vue-query';
import { type BodyInput } from '@shared/contract/endpoint';
import type * as contract from '@shared/contract/dispositions';
import {
  addCustomerApproval,
  countersign,
  listDispositions,
  proposeContainment,
  refuseSecond,
  signDisposition,
  sortLot,
} from '@/api/dispositions';
import { lotKey, useRefreshLot } from './useLot';

export function useDispositions(lotId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => [...lotKey(toValue(lotId)), 'dispositions']),
    queryFn: ({ signal }) => listDispositions(toValue(lotId), signal),
  });
}

/** Other lots to be held with this one; asked for once somebody is about to hold. */
export function useContainment(
  lotId: MaybeRefOrGetter<string>,
  enabled: MaybeRefOrGetter<boolean>,
) {
  return useQuery({
    queryKey: computed(() => [...lotKey(toValue(lotId)), 'containment']),
    queryFn: ({ signal }) => proposeContainment(toValue(lotId), signal),
    enabled: computed(() => toValue(enabled)),
  });
}

/** The signed acts on a lot. What they change is asked for anew before the promise ends. */
export function useSignedActs(lotId: MaybeRefOrGetter<string>) {
  const onSuccess = useRefreshLot(lotId);
  const sign = useMutation({
    mutationFn: (body: BodyInput<typeof contract.signDisposition>) =>
      signDisposition(toValue(lotId), body),
    onSuccess,
  });
  const sort = useMutation({
    mutationFn: (body: BodyInput<typeof contract.sortLot>) => sortLot(toValue(lotId), body),
    onSuccess,
  });
  const second = useMutation({
    mutationFn: ({ id, ...body }: { id: string; password: string; reason: string }) =>
      countersign(id, body),
    onSuccess,
  });
  const refuse = useMutation({
    mutationFn: ({ id, reason }: { id: string; reason: string }) => refuseSecond(id, reason),
    onSuccess,
  });
  const approve = useMutation({
    mutationFn: ({ id, files }: { id: string; files: readonly File[] }) =>
      addCustomerApproval(id, files),
    onSuccess,
  });
  return { sign, sort, second, refuse, approve };
}
