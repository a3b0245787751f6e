import type { Table } from '../../src/core/data/table';

/** A table as CSV: column heads carry their units, numbers keep full precision, missing values are empty. */
export function csvOf(table: Pick<Table, 'columns' | 'rows'>): string {
  const head = table.columns.map((c) => cell(c.unit === '' ? c.label : `${c.label} [${c.unit}]`));
  const rows = table.rows.map((row) => row.map((v) => (v === null ? '' : cell(String(v)))));
  return [head, ...rows].map((r) => r.join(',')).join('\n') + '\n';
}

function cell(text: string): string {
  return /[",\n\r]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
