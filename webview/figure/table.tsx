import { useState } from 'preact/hooks';
import type { JSX } from 'preact';
import type { Cell, Table } from '../../src/core/data/table';
import { csvOf } from '../words/csv';
import { numberText } from '../../src/core/figures/shown-number';

interface Props {
  readonly table: Table;
  readonly onCopy: (text: string, what: string) => void;
  /** Rows shown before "Show all". */
  readonly first?: number;
}

/** A table with units in its heads, its first rows at once and all of them on demand; copied as CSV with full precision. */
export function DataTable({ table, onCopy, first = 12 }: Props): JSX.Element {
  const [all, setAll] = useState(false);
  const rows = all ? table.rows : table.rows.slice(0, first);
  const rest = table.rows.length - rows.length;
  return (
    <div class="table-box">
      <div class="table-head">
        <span class="table-title">{table.title}</span>
        <span class="muted">
          {table.rows.length} {table.rows.length === 1 ? 'row' : 'rows'}
        </span>
        <button
          type="button"
          class="text-button"
          onClick={() => onCopy(csvOf(table), `${table.title} as CSV`)}
        >
          Copy CSV
        </button>
      </div>
      <div class="table-scroll" tabIndex={0} role="region" aria-label={table.title}>
        <table>
          <thead>
            <tr>
              {table.columns.map((c) => (
                <th key={c.id} scope="col">
                  {c.label}
                  {c.unit !== '' && <span class="unit"> [{c.unit}]</span>}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row, i) => (
              <tr key={i}>
                {row.map((v, k) => (
                  <td key={k} class={typeof v === 'number' ? 'number' : undefined}>
                    {cellText(v)}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {rest > 0 && (
        <button type="button" class="text-button" onClick={() => setAll(true)}>
          Show {rest} more {rest === 1 ? 'row' : 'rows'}
        </button>
      )}
    </div>
  );
}

function cellText(v: Cell): string {
  if (v === null) return '–';
  return typeof v === 'number' ? numberText(v, 6) : v;
}
