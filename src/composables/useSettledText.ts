import { ref, watch } from 'vue';
import { watchDebounced } from '@vueuse/core';

/** What one types into a find field, handed on once one pauses; follows the address when that changes elsewhere. */
export function useSettledText(given: () => string, settle: (text: string) => void) {
  const text = ref(given());
  watch(given, (now) => {
    if (now !== text.value.trim()) text.value = now;
  });
  watchDebounced(
    text,
    (now) => {
      if (now.trim() !== given()) settle(now.trim());
    },
    { debounce: 250 },
  );
  return text;
}
