import { useId, type Ref } from 'vue';
import { onClickOutside, useEventListener } from '@vueuse/core';

/** A panel that its button opens: Escape, a click elsewhere, or leaving by Tab closes it; Escape gives the focus back. */
export function useDisclosure(root: Readonly<Ref<HTMLElement | null>>, isOpen: Ref<boolean>) {
  const panelId = useId();

  onClickOutside(root, () => (isOpen.value = false));
  useEventListener(root, 'keydown', (event: KeyboardEvent) => {
    if (event.key !== 'Escape' || !isOpen.value) return;
    event.stopPropagation();
    isOpen.value = false;
    root.value?.querySelector<HTMLElement>('[aria-expanded]')?.focus();
  });
  useEventListener(root, 'focusout', (event: FocusEvent) => {
    const next = event.relatedTarget;
    if (next instanceof Node && !root.value?.contains(next)) isOpen.value = false;
  });

  return { panelId };
}
