import { computed, type WritableComputedRef } from 'vue';
import { useRoute, useRouter } from 'vue-router';

/**
 * What a list is filtered and sorted by, held in the address, so that a link shows exactly this and the back button
 * works: `const { find, state } = useAddressState({ find: '', state: '' })`. A value equal to its default leaves the address.
 */
export function useAddressState<State extends Record<string, string>>(
  defaults: State,
  { replaces = true }: { replaces?: boolean } = {},
): { [Key in keyof State]: WritableComputedRef<string> } & {
  set: (values: Partial<State>) => Promise<void>;
} {
  const route = useRoute();
  const router = useRouter();

  async function set(values: Partial<State>): Promise<void> {
    const query = { ...route.query };
    for (const [key, value] of Object.entries(values)) {
      if (value === undefined || value === defaults[key]) delete query[key];
      else query[key] = value;
    }
    await (replaces
      ? router.replace({ query, hash: route.hash })
      : router.push({ query, hash: route.hash }));
  }

  const refs = Object.fromEntries(
    Object.keys(defaults).map((key) => [
      key,
      computed({
        get: () => {
          const value = route.query[key];
          return typeof value === 'string' ? value : defaults[key];
        },
        set: (value) => void set({ [key]: value } as Partial<State>),
      }),
    ]),
  );
  return { ...refs, set } as ReturnType<typeof useAddressState<State>>;
}
