export interface TableColumn<Row> {
  /** Also the name of the cell's slot: `#cell-<key>="{ row }"`. */
  key: string;
  heading: string;
  /** Numbers go to the end. */
  align?: 'start' | 'end';
  sortable?: boolean;
  /** The cell that names its row; one a table. */
  isRowHeading?: boolean;
  /** May be hidden by choice; true unless said otherwise, never for the row heading. */
  canHide?: boolean;
  hiddenAtFirst?: boolean;
  /** What the cell shows without a slot, and what a table that sorts itself compares. */
  value?: (row: Row) => string | number | null;
}

export interface TableSort {
  key: string;
  direction: 'ascending' | 'descending';
}
