import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { type TableColumn } from '@/components/tables/table-types';
import { usePreferences } from '@/stores/preferences';

/** The columns a table shows to this person. Hidden ones are remembered, so a new column appears and a removed one drops out. */
export function useTableColumns<Row>(
  name: MaybeRefOrGetter<string>,
  columns: MaybeRefOrGetter<readonly TableColumn<Row>[]>,
) {
  const preferences = usePreferences();
  const choosable = computed(() =>
    toValue(columns).filter((column) => column.canHide !== false && !column.isRowHeading),
  );
  const hidden = computed(() => {
    const kept = preferences.hiddenColumns[toValue(name)];
    const keys =
      kept ??
      toValue(columns)
        .filter(({ hiddenAtFirst }) => hiddenAtFirst)
        .map(({ key }) => key);
    return keys.filter((key) => choosable.value.some((column) => column.key === key));
  });
  const shown = computed(() => toValue(columns).filter(({ key }) => !hidden.value.includes(key)));

  return {
    shown,
    hidden,
    choosable,
    setHidden: (keys: string[]) => preferences.setHidden(toValue(name), keys),
  };
}
