import { ref } from 'vue';

const isOpen = ref(false);

/** Whether the "Go to" panel is open; one for the whole page, opened from the bar or by a key. */
export function useGoTo() {
  return { isOpen, openGoTo: () => (isOpen.value = true) };
}
