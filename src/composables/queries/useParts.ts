import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import {
  addPart,
  approvePartRevision,
  changePart,
  changePartRevision,
  draftPartRevision,
  listParts,
  readPart,
  type ApprovePartRevision,
  type ChangePart,
  type ChangePartRevision,
  type DraftPartRevision,
  type PartQuery,
  type PartWithRevisions,
} from '@/api/parts';

export function useParts(query: MaybeRefOrGetter<PartQuery>) {
  return useQuery({
    queryKey: computed(() => ['parts', 'list', toValue(query)]),
    queryFn: ({ signal }) => listParts(toValue(query), signal),
    placeholderData: keepPreviousData,
  });
}

/** A part with all its revisions; nothing is asked for while there is no id. */
export function usePart(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => ['parts', 'one', toValue(id)]),
    queryFn: ({ signal }) => readPart(toValue(id), signal),
    enabled: computed(() => toValue(id) !== ''),
  });
}

/** What may be done to parts and their revisions; each answer is the whole part as it stands afterwards. */
export function usePartActs() {
  const queries = useQueryClient();
  const onSuccess = (part: PartWithRevisions) => {
    queries.setQueryData(['parts', 'one', part.id], part);
    for (const queryKey of [['parts', 'list'], ['receivers'], ['lots'], ['work'], ['history']])
      void queries.invalidateQueries({ queryKey });
  };
  const add = useMutation({ mutationFn: addPart, onSuccess });
  const change = useMutation({
    mutationFn: ({ id, ...body }: ChangePart & { id: string }) => changePart(id, body),
    onSuccess,
  });
  const draft = useMutation({
    mutationFn: ({ id, ...body }: DraftPartRevision & { id: string }) =>
      draftPartRevision(id, body),
    onSuccess,
  });
  const changeRevision = useMutation({
    mutationFn: ({
      id,
      revisionId,
      ...body
    }: ChangePartRevision & { id: string; revisionId: string }) =>
      changePartRevision(id, revisionId, body),
    onSuccess,
  });
  const approve = useMutation({
    mutationFn: ({
      id,
      revisionId,
      ...body
    }: ApprovePartRevision & { id: string; revisionId: string }) =>
      approvePartRevision(id, revisionId, body),
    onSuccess,
  });
  return { add, change, draft, changeRevision, approve };
}
