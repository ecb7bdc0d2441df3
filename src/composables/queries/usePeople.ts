import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import {
  changePerson,
  disablePerson,
  enablePerson,
  endPersonSessions,
  invitePerson,
  listPeople,
  readPerson,
  sendPersonLink,
  unlockPerson,
  type ChangePerson,
  type PeopleQuery,
  type Person,
} from '@/api/people';

export function usePeople(query: MaybeRefOrGetter<PeopleQuery>) {
  return useQuery({
    queryKey: computed(() => ['people', 'list', toValue(query)]),
    queryFn: ({ signal }) => listPeople(toValue(query), signal),
    placeholderData: keepPreviousData,
  });
}

const personKey = (id: string) => ['people', 'one', id];

/** A person; while a link's mail is on its way its state is looked at again. */
export function usePerson(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => personKey(toValue(id))),
    queryFn: ({ signal }) => readPerson(toValue(id), signal),
    refetchInterval: ({ state }) => (state.data?.link?.mailState === 'queued' ? 3000 : false),
  });
}

export function useInvitePerson() {
  const queries = useQueryClient();
  return useMutation({
    mutationFn: invitePerson,
    onSuccess: (person) => keep(queries, person),
  });
}

/** What an administrator may do to a person; setting a password is not among it. */
export function usePersonActs(id: MaybeRefOrGetter<string>) {
  const queries = useQueryClient();
  const onSuccess = (person: Person) => keep(queries, person);
  const change = useMutation({
    mutationFn: (body: ChangePerson) => changePerson(toValue(id), body),
    onSuccess,
  });
  const disable = useMutation({
    mutationFn: (reason: string) => disablePerson(toValue(id), reason),
    onSuccess,
  });
  const enable = useMutation({ mutationFn: () => enablePerson(toValue(id)), onSuccess });
  const sendLink = useMutation({ mutationFn: () => sendPersonLink(toValue(id)), onSuccess });
  const unlock = useMutation({ mutationFn: () => unlockPerson(toValue(id)), onSuccess });
  const endSessions = useMutation({
    mutationFn: () => endPersonSessions(toValue(id)),
    onSuccess: () => queries.invalidateQueries({ queryKey: ['history'] }),
  });
  return { change, disable, enable, sendLink, unlock, endSessions };
}

function keep(queries: ReturnType<typeof useQueryClient>, person: Person): void {
  queries.setQueryData(personKey(person.id), person);
  for (const queryKey of [['people', 'list'], ['suppliers'], ['mail'], ['history']])
    void queries.invalidateQueries({ queryKey });
}
