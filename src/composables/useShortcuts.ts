import { useRouter } from 'vue-router';
import { useEventListener } from '@vueuse/core';
import { usePreferences } from '@/stores/preferences';
import { useSession } from '@/stores/session';
import { useGoTo } from './useGoTo';

/** Single letters, by what they open: the name of a page, or a thing of the frame. */
export const letterKeys = [
  { key: 'g', opens: 'goTo' },
  { key: '/', opens: 'find' },
  { key: 'w', opens: 'work' },
  { key: 'l', opens: 'lots' },
  { key: 'n', opens: 'lots-new' },
  { key: 'h', opens: 'holds' },
  { key: '?', opens: 'keys' },
] as const;
type Opens = (typeof letterKeys)[number]['opens'];

const isMac = /Mac|iPhone|iPad/.test(navigator.userAgent);
export const goToKey = isMac ? '⌘ K' : 'Ctrl K';

/** What the person who is signed in can reach by a letter. */
export function useLetterKeys() {
  const router = useRouter();
  const session = useSession();
  const isOpenTo = (name: Opens) => {
    if (name === 'goTo' || name === 'find') return true;
    if (!router.hasRoute(name)) return false;
    const { roles } = router.resolve({ name }).meta;
    return !Array.isArray(roles) || roles.includes(session.role);
  };
  return { mine: () => letterKeys.filter(({ opens }) => isOpenTo(opens)) };
}

/** Ctrl K (⌘ K) always; single letters unless switched off, and never while somebody writes or a dialog is open. */
export function useShortcuts() {
  const router = useRouter();
  const preferences = usePreferences();
  const { isOpen } = useGoTo();
  const { mine } = useLetterKeys();

  useEventListener(document, 'keydown', (event: KeyboardEvent) => {
    if (event.defaultPrevented || event.isComposing || event.repeat) return;
    const hasCommand = isMac ? event.metaKey : event.ctrlKey;
    if (hasCommand && !event.shiftKey && !event.altKey && event.key.toLowerCase() === 'k') {
      event.preventDefault();
      if (isOpen.value) isOpen.value = false;
      else if (!isDialogOpen()) isOpen.value = true;
      return;
    }
    if (event.ctrlKey || event.metaKey || event.altKey || !preferences.hasLetterKeys) return;
    if (isWriting(event.target) || isDialogOpen()) return;
    const found = mine().find(({ key }) => key === event.key);
    if (!found) return;
    event.preventDefault();
    open(found.opens);
  });

  function open(name: Opens): void {
    if (name === 'goTo') isOpen.value = true;
    else if (name === 'find') focusFind();
    else void router.push({ name });
  }

  /** On a narrow screen the field lies folded away; "Go to" finds the same. */
  function focusFind(): void {
    const field = document.querySelector<HTMLElement>('[data-find]');
    if (field?.checkVisibility()) field.focus();
    else isOpen.value = true;
  }
}

function isDialogOpen(): boolean {
  return document.querySelector('dialog[open], [aria-modal="true"]') !== null;
}

/** Where letters are letters: fields, and lists in which a letter chooses. */
function isWriting(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement &&
    (target.isContentEditable ||
      target.closest('input, textarea, select, [role="listbox"], [role="menu"]') !== null)
  );
}
