import { ref, watch } from 'vue';
import { defineStore } from 'pinia';

export type ThemeChoice = 'system' | 'light' | 'dark';

const storageKey = 'quartzhold.preferences';

/** What a person prefers on this machine: theme and the columns of each table. public/theme.js reads the same key before the first paint. */
export const usePreferences = defineStore('preferences', () => {
  const kept = read();
  const theme = ref<ThemeChoice>(kept.theme);
  /** Hidden columns by table name. */
  const hiddenColumns = ref<Record<string, string[]>>(kept.hiddenColumns);

  watch(
    theme,
    (choice) => {
      if (choice === 'system') delete document.documentElement.dataset.theme;
      else document.documentElement.dataset.theme = choice;
    },
    { immediate: true },
  );
  watch(
    [theme, hiddenColumns],
    () => keep({ theme: theme.value, hiddenColumns: hiddenColumns.value }),
    { deep: true },
  );

  function setHidden(table: string, columns: string[]): void {
    hiddenColumns.value = { ...hiddenColumns.value, [table]: columns };
  }

  return { theme, hiddenColumns, setHidden };
});

interface Kept {
  theme: ThemeChoice;
  hiddenColumns: Record<string, string[]>;
}

function read(): Kept {
  try {
    const kept = JSON.parse(localStorage.getItem(storageKey) ?? '{}') as Partial<Kept>;
    const theme = kept.theme === 'light' || kept.theme === 'dark' ? kept.theme : 'system';
    return { theme, hiddenColumns: kept.hiddenColumns ?? {} };
  } catch {
    return { theme: 'system', hiddenColumns: {} };
  }
}

function keep(kept: Kept): void {
  try {
    localStorage.setItem(storageKey, JSON.stringify(kept));
  } catch {
    // Private windows may refuse; the choice then lasts as long as the page.
  }
}
