/** A column of AppTable. A slot named `cell-<key>` draws its cells; without one the value of `text` is shown. */
export interface Column<Row> {
  key: string;
  label: string;
  text?: (row: Row) => string | number | null;
  /** Numbers stand at the end, so that their figures line up. */
  align?: 'start' | 'end';
  sortable?: boolean;
  /** Left out on a phone, where only what is needed to know a row fits. */
  deskOnly?: boolean;
}

export interface Sort {
  key: string;
  descending: boolean;
}
