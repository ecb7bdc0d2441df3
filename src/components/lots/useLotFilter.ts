import { computed } from 'vue';
import { LotFilter, lotStates, type LotState } from '@shared/contract/lots';
import { useAddressState } from '@/composables/useAddressState';
import { type TableSort } from '@/components/tables/table-types';
import { type LotQuery } from '@/api/lots';

const newestFirst = '-receivedOn';

/** What may stand in the address of the list of lots: the contract's filter, nothing else. */
const defaults = {
  find: '',
  state: '',
  supplierId: '',
  partId: '',
  dateCode: '',
  purchaseOrder: '',
  receivedFrom: '',
  receivedTo: '',
  sort: newestFirst,
};
export type LotFilterKey = keyof typeof defaults;
const keys = Object.keys(defaults) as LotFilterKey[];

/** The filter and sort of the list of lots, held in the address; a value the contract would refuse is as if it were not there. */
export function useLotFilter() {
  const address = useAddressState(defaults);

  const valid = computed(() => {
    const kept: Partial<Record<LotFilterKey, string>> = {};
    for (const key of keys) {
      const value = address[key].value;
      if (value !== '' && LotFilter.shape[key].safeParse(value).success) kept[key] = value;
    }
    return kept;
  });
  const query = computed(() => valid.value as Partial<LotQuery>);
  /** As it is saved under a name and put into an address again. */
  const text = computed(() =>
    new URLSearchParams(
      Object.entries(valid.value).filter(([key, value]) => value !== defaults[key as LotFilterKey]),
    ).toString(),
  );
  const isFiltered = computed(() => Object.keys(valid.value).some((key) => key !== 'sort'));

  const states = computed<LotState[]>(() =>
    lotStates.filter((state) => valid.value.state?.split(',').includes(state)),
  );
  const setStates = (chosen: LotState[]) => (address.state.value = chosen.join(','));
  const sort = computed<TableSort | null>({
    get: (): TableSort => {
      const value = valid.value.sort ?? newestFirst;
      return value.startsWith('-')
        ? { key: value.slice(1), direction: 'descending' }
        : { key: value, direction: 'ascending' };
    },
    set: (chosen: TableSort | null) => {
      address.sort.value = chosen
        ? `${chosen.direction === 'descending' ? '-' : ''}${chosen.key}`
        : newestFirst;
    },
  });

  function apply(saved: string): Promise<void> {
    const given = new URLSearchParams(saved);
    return address.set(
      Object.fromEntries(keys.map((key) => [key, given.get(key) ?? defaults[key]])),
    );
  }

  const clear = () => address.set({ ...defaults, sort: address.sort.value });

  return { address, query, text, isFiltered, states, setStates, sort, apply, clear };
}
