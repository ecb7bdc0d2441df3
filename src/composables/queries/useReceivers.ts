import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import {
  addReceiver,
  approveReceiverRevision,
  changeReceiver,
  changeReceiverRevision,
  draftReceiverRevision,
  listReceivers,
  readReceiver,
  type ApproveReceiverRevision,
  type ChangeReceiver,
  type ChangeReceiverRevision,
  type DraftReceiverRevision,
  type ReceiverQuery,
  type ReceiverWithRevisions,
} from '@/api/receivers';

export function useReceivers(query: MaybeRefOrGetter<ReceiverQuery>) {
  return useQuery({
    queryKey: computed(() => ['receivers', 'list', toValue(query)]),
    queryFn: ({ signal }) => listReceivers(toValue(query), signal),
    placeholderData: keepPreviousData,
  });
}

/** A receiver with all its revisions; nothing is asked for while there is no id. */
export function useReceiver(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => ['receivers', 'one', toValue(id)]),
    queryFn: ({ signal }) => readReceiver(toValue(id), signal),
    enabled: computed(() => toValue(id) !== ''),
  });
}

/** What may be done to receivers and their revisions; each answer is the whole receiver as it stands afterwards. */
export function useReceiverActs() {
  const queries = useQueryClient();
  const onSuccess = (receiver: ReceiverWithRevisions) => {
    queries.setQueryData(['receivers', 'one', receiver.id], receiver);
    for (const queryKey of [['receivers', 'list'], ['parts'], ['lots'], ['work'], ['history']])
      void queries.invalidateQueries({ queryKey });
  };
  const add = useMutation({ mutationFn: addReceiver, onSuccess });
  const change = useMutation({
    mutationFn: ({ id, ...body }: ChangeReceiver & { id: string }) => changeReceiver(id, body),
    onSuccess,
  });
  const draft = useMutation({
    mutationFn: ({ id, ...body }: DraftReceiverRevision & { id: string }) =>
      draftReceiverRevision(id, body),
    onSuccess,
  });
  const changeRevision = useMutation({
    mutationFn: ({
      id,
      revisionId,
      ...body
    }: ChangeReceiverRevision & { id: string; revisionId: string }) =>
      changeReceiverRevision(id, revisionId, body),
    onSuccess,
  });
  const approve = useMutation({
    mutationFn: ({
      id,
      revisionId,
      ...body
    }: ApproveReceiverRevision & { id: string; revisionId: string }) =>
      approveReceiverRevision(id, revisionId, body),
    onSuccess,
  });
  return { add, change, draft, changeRevision, approve };
}
