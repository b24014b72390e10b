/** A column of a table of values. */
export interface Column<R> {
  key: string;
  label: string;
  unit?: string;
  number?: boolean;
  /** What is shown; a number is also what is sorted by. */
  read: (row: R) => string | number | null;
}
