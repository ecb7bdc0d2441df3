import { nextTick, readonly, ref } from 'vue';

const spoken = ref('');

/** Speaks to screen readers without moving anything on the page. */
export function useAnnouncer() {
  async function announce(text: string): Promise<void> {
    // The same sentence twice is only read again when the region was empty in between.
    spoken.value = '';
    await nextTick();
    spoken.value = text;
  }
  return { spoken: readonly(spoken), announce };
}
