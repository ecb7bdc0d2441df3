import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import { listMail, readMail, resendMail, type MailQuery } from '@/api/mail';

export function useMailList(query: MaybeRefOrGetter<MailQuery>) {
  return useQuery({
    queryKey: computed(() => ['mail', 'list', toValue(query)]),
    queryFn: ({ signal }) => listMail(toValue(query), signal),
    placeholderData: keepPreviousData,
  });
}

/** One mail; while it is still to be sent, its state is looked at again every few seconds. */
export function useMail(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => ['mail', 'one', toValue(id)]),
    queryFn: ({ signal }) => readMail(toValue(id), signal),
    refetchInterval: ({ state }) => (state.data?.state === 'queued' ? 3000 : false),
  });
}

export function useResendMail(id: MaybeRefOrGetter<string>) {
  const queries = useQueryClient();
  return useMutation({
    mutationFn: () => resendMail(toValue(id)),
    onSuccess: (mail) => {
      queries.setQueryData(['mail', 'one', mail.id], mail);
      for (const queryKey of [['mail', 'list'], ['work'], ['history']])
        void queries.invalidateQueries({ queryKey });
    },
  });
}
