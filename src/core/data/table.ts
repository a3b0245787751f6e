/** Rows of values with a unit per column; what "show as text" prints and CSV export writes. */
export interface Table {
  readonly kind: 'table';
  readonly id: string;
  readonly title: string;
  readonly columns: readonly Column[];
  readonly rows: readonly (readonly Cell[])[];
}

export interface Column {
  readonly id: string;
  readonly label: string;
  readonly unit: string;
}

export type Cell = number | string | null;
