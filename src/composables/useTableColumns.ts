import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { type TableColumn } from '@/components/tables/table-types';
import { useTablePreferences } from '@/composables/queries/useTablePreferences';

/** The columns a table shows to this person, and the choice of them, kept with the person. */
export function useTableColumns<Row>(
  name: MaybeRefOrGetter<string>,
  columns: MaybeRefOrGetter<readonly TableColumn<Row>[]>,
) {
  const preferences = useTablePreferences();
  const choosable = computed(() =>
    toValue(columns).filter((column) => column.canHide !== false && !column.isRowHeading),
  );
  const hidden = computed(() => {
    const kept = preferences.columnsOf(toValue(name));
    return choosable.value
      .filter(({ key, hiddenAtFirst }) => {
        if (kept?.includes(key)) return false;
        return kept?.includes(`-${key}`) || Boolean(hiddenAtFirst);
      })
      .map(({ key }) => key);
  });
  const shown = computed(() => toValue(columns).filter(({ key }) => !hidden.value.includes(key)));

  function setHidden(keys: string[]): void {
    preferences.set(
      toValue(name),
      choosable.value.map(({ key }) => (keys.includes(key) ? `-${key}` : key)),
    );
  }

  return { shown, hidden, choosable, setHidden };
}
