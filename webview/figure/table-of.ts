import type { Axis, Figure, Trace } from '../../src/core/figures/figure';
import { loudestInColumn, rowCentre } from '../../src/core/figures/image';
import type { Cell, Column, Table } from '../../src/core/data/table';

/** The points a figure shows as tables, one per trace: the text alternative, and what is copied as CSV. */
export function tablesOf(figure: Figure): Table[] {
  const marks = marksTable(figure);
  return [...figure.traces.map((t, i) => traceTable(t, i, figure)), ...(marks ? [marks] : [])];
}

function traceTable(trace: Trace, index: number, { x, y }: Figure): Table {
  const at = column('x', x);
  const base = { kind: 'table', id: `trace-${index}`, title: trace.name } as const;
  const value = (v: number): Cell => (Number.isNaN(v) ? null : v);
  switch (trace.type) {
    case 'line':
      return {
        ...base,
        columns: [at, { ...column('y', y), label: trace.name }],
        rows: Array.from(trace.x, (v, i) => [v, value(trace.y[i])]),
      };
    case 'range':
      return {
        ...base,
        columns: [
          at,
          { ...column('low', y), label: `${trace.name}, low` },
          { ...column('high', y), label: `${trace.name}, high` },
        ],
        rows: Array.from(trace.x, (v, i) => [v, value(trace.low[i]), value(trace.high[i])]),
      };
    case 'points':
      return {
        ...base,
        columns: [at, column('y', y), { id: 'label', label: 'What', unit: '' }],
        rows: Array.from(trace.x, (v, i) => [v, trace.y[i], trace.labels[i] ?? '']),
      };
    case 'image':
      return {
        ...base,
        title: `${trace.name}: largest value of each column`,
        columns: [
          at,
          { ...column('y', y), label: `${y.label} of it` },
          { id: 'value', label: trace.quantity, unit: trace.unit },
        ],
        rows: Array.from({ length: trace.columns }, (_, i): Cell[] => {
          const best = loudestInColumn(trace, i);
          const middle = trace.x[0] + ((i + 0.5) * (trace.x[1] - trace.x[0])) / trace.columns;
          return [middle, best ? rowCentre(trace, best.row, y.scale) : null, best?.value ?? null];
        }),
      };
    case 'bars':
      return {
        ...base,
        columns: [
          { ...at, id: 'from', label: `${x.label}, from` },
          { ...at, id: 'to', label: `${x.label}, to` },
          { ...column('count', y), label: trace.name },
        ],
        rows: Array.from(trace.counts, (c, i) => [trace.edges[i], trace.edges[i + 1], c]),
      };
  }
}

function marksTable({ marks, x }: Figure): Table | undefined {
  if (marks.length === 0) return undefined;
  const at = column('from', x);
  return {
    kind: 'table',
    id: 'marks',
    title: 'Marked stretches',
    columns: [
      { id: 'role', label: 'Kind', unit: '' },
      { ...at, label: 'From' },
      { ...at, id: 'to', label: 'To' },
      { id: 'label', label: 'What', unit: '' },
    ],
    rows: marks.map((m) => [m.role, m.from, m.to, m.label]),
  };
}

function column(id: string, axis: Axis): Column {
  return { id, label: axis.label, unit: axis.unit };
}
