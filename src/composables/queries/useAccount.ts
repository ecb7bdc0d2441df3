import { useMutation, useQuery, useQueryClient } from '@tanstack/vue-query';
import { changePassword, endSession, listSessions, setMailChoice } from '@/api/account';
import { useSession } from '@/stores/session';

export function useOpenSessions() {
  return useQuery({
    queryKey: ['account', 'sessions'],
    queryFn: ({ signal }) => listSessions(signal),
  });
}

export function useAccountActs() {
  const queries = useQueryClient();
  const session = useSession();
  const refresh = () => queries.invalidateQueries({ queryKey: ['account'] });
  const end = useMutation({ mutationFn: endSession, onSuccess: refresh });
  const password = useMutation({ mutationFn: changePassword, onSuccess: refresh });
  const mailChoice = useMutation({
    mutationFn: setMailChoice,
    onSuccess: (person) => (session.person = person),
  });
  return { end, password, mailChoice };
}
