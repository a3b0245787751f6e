import type { Quantity } from '../../core/data/quantity';
import type { Cell, Table } from '../../core/data/table';

/** A value with digits that its size deserves; never loses the exponent. */
export function number(v: number, digits = 5): string {
  if (!Number.isFinite(v)) return String(v);
  if (Number.isInteger(v) && Math.abs(v) < 1e15) return String(v);
  const a = Math.abs(v);
  return a !== 0 && (a < 1e-3 || a >= 1e6)
    ? v.toExponential(digits - 1)
    : String(Number(v.toPrecision(digits)));
}

export function quantityValue(q: Quantity): string {
  const unit = q.unit === '' ? '' : ` ${q.unit}`;
  const interval =
    q.low !== undefined && q.high !== undefined
      ? `  [${number(q.low, 3)}, ${number(q.high, 3)}]${q.intervalMeaning === undefined ? '' : ` ${q.intervalMeaning}`}`
      : '';
  const convention = q.convention === undefined ? '' : `  (${q.convention})`;
  return `${number(q.value)}${unit}${interval}${convention}`;
}

/** Rows in columns two blanks apart; numbers to the right. */
export function columns(
  rows: readonly (readonly string[])[],
  right: readonly boolean[] = [],
  indent = '',
): string {
  const widths: number[] = [];
  for (const row of rows) row.forEach((c, i) => (widths[i] = Math.max(widths[i] ?? 0, c.length)));
  const line = (row: readonly string[]): string =>
    row
      .map((c, i) => (right[i] ? c.padStart(widths[i]) : i === row.length - 1 ? c : c.padEnd(widths[i])))
      .join('  ');
  return rows.map((r) => `${indent}${line(r).trimEnd()}\n`).join('');
}

const cell = (c: Cell): string => (c === null ? '–' : typeof c === 'number' ? number(c) : c);

export function tableText(table: Table, indent = ''): string {
  const head = table.columns.map((c) => (c.unit === '' ? c.label : `${c.label} (${c.unit})`));
  const right = table.columns.map((_, i) => table.rows.some((r) => typeof r[i] === 'number'));
  return `${indent}${table.title}\n${columns([head, ...table.rows.map((r) => r.map(cell))], right, `${indent}  `)}`;
}

/** Words of `text` in lines of at most `width`, later lines indented by `hang`. */
export function wrap(text: string, width: number, hang = ''): string {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(/\s+/)) {
    if (line !== '' && line.length + 1 + word.length > width) {
      lines.push(line);
      line = hang + word;
    } else line = line === '' ? word : `${line} ${word}`;
  }
  return `${[...lines, line].join('\n')}\n`;
}
