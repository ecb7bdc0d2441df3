import { type LotRow } from '@shared/contract/lots';
import { type TableColumn } from '@/components/tables/table-types';

/** The columns of the list of lots; those one may sort by are named as the contract's sort is. */
export function lotColumns(t: (key: string) => string): TableColumn<LotRow>[] {
  const heading = (key: string) => t(`lots.list.column.${key}`);
  return [
    { key: 'lotNumber', heading: heading('lot'), isRowHeading: true, sortable: true },
    { key: 'part', heading: heading('part') },
    { key: 'strip', heading: heading('strip') },
    { key: 'beyond', heading: heading('beyond'), align: 'end' },
    { key: 'state', heading: heading('state') },
    { key: 'stateSince', heading: heading('waiting'), align: 'end', sortable: true },
    { key: 'next', heading: heading('next') },
    { key: 'receivedOn', heading: heading('received'), sortable: true },
    { key: 'lotSize', heading: heading('size'), align: 'end', sortable: true, hiddenAtFirst: true },
    {
      key: 'measured',
      heading: heading('measured'),
      align: 'end',
      hiddenAtFirst: true,
    },
    {
      key: 'purchaseOrder',
      heading: heading('purchaseOrder'),
      hiddenAtFirst: true,
      value: ({ purchaseOrder }) => purchaseOrder || null,
    },
  ];
}
