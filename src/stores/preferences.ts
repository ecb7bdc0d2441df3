import { ref, watch } from 'vue';
import { defineStore } from 'pinia';

export type ThemeChoice = 'system' | 'light' | 'dark';

const storageKey = 'quartzhold.preferences';

/** What a person prefers on this machine: the theme. public/theme.js reads the same key before the first paint. */
export const usePreferences = defineStore('preferences', () => {
  const theme = ref<ThemeChoice>(read());

  watch(
    theme,
    (choice) => {
      if (choice === 'system') delete document.documentElement.dataset.theme;
      else document.documentElement.dataset.theme = choice;
    },
    { immediate: true },
  );
  watch(theme, keep);

  return { theme };
});

function read(): ThemeChoice {
  try {
    const kept = JSON.parse(localStorage.getItem(storageKey) ?? '{}') as { theme?: unknown };
    return kept.theme === 'light' || kept.theme === 'dark' ? kept.theme : 'system';
  } catch {
    return 'system';
  }
}

function keep(theme: ThemeChoice): void {
  try {
    localStorage.setItem(storageKey, JSON.stringify({ theme }));
  } catch {
    // Private windows may refuse; the choice then lasts as long as the page.
  }
}
