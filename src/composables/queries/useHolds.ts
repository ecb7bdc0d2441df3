import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import {
  acknowledgeHold,
  answerHold,
  listHolds,
  readHold,
  writeToHold,
  type Hold,
  type HoldQuery,
} from '@/api/holds';

export function useHolds(query: MaybeRefOrGetter<HoldQuery>) {
  return useQuery({
    queryKey: computed(() => ['holds', 'list', toValue(query)]),
    queryFn: ({ signal }) => listHolds(toValue(query), signal),
    placeholderData: keepPreviousData,
  });
}

const holdKey = (id: string) => ['holds', 'one', id];

/** A hold with its conversation; the other side may write at any time, so it is looked at again every half minute. */
export function useHold(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => holdKey(toValue(id))),
    queryFn: ({ signal }) => readHold(toValue(id), signal),
    refetchInterval: 30_000,
  });
}

export interface AnswerInput {
  containment: string;
  cause: string;
  correctiveAction: string;
  text: string;
  files: readonly File[];
}

/** What one may do to a hold; the server's answer is the hold as it stands afterwards. */
export function useHoldActs(id: MaybeRefOrGetter<string>) {
  const queries = useQueryClient();
  const onSuccess = (hold: Hold) => {
    queries.setQueryData(holdKey(hold.id), hold);
    for (const queryKey of [['holds', 'list'], ['work'], ['lots'], ['mail'], ['history']])
      void queries.invalidateQueries({ queryKey });
  };
  // Refused because somebody else was first: then what is shown is old.
  const onError = () => void queries.invalidateQueries({ queryKey: holdKey(toValue(id)) });
  const acknowledge = useMutation({
    mutationFn: (note: string) => acknowledgeHold(toValue(id), note),
    onSuccess,
    onError,
  });
  const answer = useMutation({
    mutationFn: ({ files, ...texts }: AnswerInput) => answerHold(toValue(id), texts, files),
    onSuccess,
    onError,
  });
  const write = useMutation({
    mutationFn: ({ text, files }: { text: string; files: readonly File[] }) =>
      writeToHold(toValue(id), text, files),
    onSuccess,
    onError,
  });
  return { acknowledge, answer, write };
}
