import { computed, ref } from 'vue';
import { defineStore } from 'pinia';
import { type CurrentPerson } from '@shared/contract/session';
import { api, ApiError } from '@/api/client';

export type Role = CurrentPerson['role'];

/** Who is signed in. `person` is null for nobody; `isKnown` is false until the server was asked once. */
export const useSession = defineStore('session', () => {
  const person = ref<CurrentPerson | null>(null);
  const isKnown = ref(false);
  let asking: Promise<void> | null = null;

  const role = computed(() => person.value?.role ?? null);

  /** Asks the server once; later calls wait for the same answer. Throws when the server cannot be reached. */
  function load(): Promise<void> {
    if (isKnown.value) return Promise.resolve();
    asking ??= ask().finally(() => (asking = null));
    return asking;
  }

  async function ask(): Promise<void> {
    try {
      person.value = await api.get<CurrentPerson>('/api/session', { expectsSignedOut: true });
    } catch (error) {
      if (!(error instanceof ApiError) || error.status !== 401) throw error;
      person.value = null;
    }
    isKnown.value = true;
  }

  async function signIn(email: string, password: string): Promise<void> {
    person.value = await api.post<CurrentPerson>(
      '/api/session',
      { email, password },
      { expectsSignedOut: true },
    );
    isKnown.value = true;
  }

  async function signOut(): Promise<void> {
    try {
      await api.delete('/api/session', { expectsSignedOut: true });
    } catch (error) {
      if (!(error instanceof ApiError) || error.status !== 401) throw error;
    }
    forget();
  }

  async function extend(): Promise<void> {
    person.value = await api.post<CurrentPerson>('/api/session/extension');
  }

  function forget(): void {
    person.value = null;
    isKnown.value = true;
  }

  return { person, isKnown, role, load, signIn, signOut, extend, forget };
});
