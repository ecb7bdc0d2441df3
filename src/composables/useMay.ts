import { computed } from 'vue';
import { useSession, type Role } from '@/stores/session';

/** Whether the person who is signed in has one of these roles: what is not theirs is not shown. The server decides again. */
export function useMay(...roles: Role[]) {
  const session = useSession();
  return computed(() => session.role !== null && roles.includes(session.role));
}
