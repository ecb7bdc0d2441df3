import { computed, ref, watch } from 'vue';
import { defineStore } from 'pinia';
import { type NumberSigns, signsOf } from '@shared/format/signs';

export type ThemeChoice = 'system' | 'light' | 'dark';
export type SignsChoice = 'system' | 'point' | 'comma';

interface Kept {
  theme: ThemeChoice;
  signs: SignsChoice;
  hasLetterKeys: boolean;
}

const storageKey = 'quartzhold.preferences';

/**
 * What a person prefers on this machine: the theme, how numbers are written, and whether single letters are shortcuts.
 * public/theme.js reads the same key before the first paint.
 */
export const usePreferences = defineStore('preferences', () => {
  const kept = read();
  const theme = ref(kept.theme);
  const signs = ref(kept.signs);
  const hasLetterKeys = ref(kept.hasLetterKeys);
  const numberSigns = computed(() => signsFor(signs.value));

  watch(
    theme,
    (choice) => {
      if (choice === 'system') delete document.documentElement.dataset.theme;
      else document.documentElement.dataset.theme = choice;
    },
    { immediate: true },
  );
  watch([theme, signs, hasLetterKeys], () =>
    keep({ theme: theme.value, signs: signs.value, hasLetterKeys: hasLetterKeys.value }),
  );

  return { theme, signs, numberSigns, hasLetterKeys };
});

function signsFor(choice: SignsChoice): NumberSigns {
  const locale = { system: navigator.language, point: 'en', comma: 'de' }[choice];
  return signsOf(new Intl.NumberFormat(locale).formatToParts(12345.6));
}

function read(): Kept {
  let kept: Partial<Kept> = {};
  try {
    kept = (JSON.parse(localStorage.getItem(storageKey) ?? '{}') ?? {}) as Partial<Kept>;
  } catch {
    // What cannot be read is as if nothing had been chosen.
  }
  return {
    theme: kept.theme === 'light' || kept.theme === 'dark' ? kept.theme : 'system',
    signs: kept.signs === 'point' || kept.signs === 'comma' ? kept.signs : 'system',
    hasLetterKeys: kept.hasLetterKeys !== false,
  };
}

function keep(preferences: Kept): void {
  try {
    localStorage.setItem(storageKey, JSON.stringify(preferences));
  } catch {
    // Private windows may refuse; the choice then lasts as long as the page.
  }
}
