import { UserError } from '../data/errors';
import { latin1, utf8 } from './bytes';
import type { Clue } from './facts';
import { readInstant } from './instant';
import { meaningOf, wordsOf } from './meaning';
import { cellValue, splitCells, type CellStyle, type Delimiter } from './text-cells';

interface TextColumn {
  /** Unique in the file. */
  readonly name: string;
  /** As written in the header, "" without one. */
  readonly header: string;
  readonly unit?: string;
}

/** How a text file is laid out, found from its first lines. */
export interface Dialect extends CellStyle {
  readonly columns: readonly TextColumn[];
  /** Offset and 1-based number of the first line with numbers. */
  readonly dataOffset: number;
  readonly dataLine: number;
  /** 10, or 13 in files whose lines end with a bare carriage return. */
  readonly newline: number;
  /** "key: value" pairs of comments and header lines. */
  readonly clues: readonly Clue[];
  /** The first rows, for deciding what the columns are. */
  readonly probe: readonly (readonly string[])[];
  readonly notes: readonly string[];
}

interface Line {
  readonly text: string;
  readonly offset: number;
  readonly number: number;
}

const DELIMITERS: readonly Delimiter[] = ['\t', ';', ',', ' '];
const PROBE_LINES = 4096;
const COMMENT = /^\s*[#%]/;

/** Lines of the head; the last one is left out when the head may cut it (`whole` false). */
function linesOf(head: Uint8Array, whole: boolean): { lines: Line[]; newline: number } {
  const newline = head.includes(10) || !head.includes(13) ? 10 : 13;
  const text = latin1(head);
  const lines: Line[] = [];
  const mark = text.startsWith('\xef\xbb\xbf') ? 3 : 0;
  for (let at = mark, number = 1; at < text.length && lines.length < PROBE_LINES; number++) {
    const end = text.indexOf(String.fromCharCode(newline), at);
    if (end < 0 && !whole && lines.length > 0) break;
    const stop = end < 0 ? text.length : end;
    lines.push({ text: utf8(head.subarray(at, stop)).replace(/\r$/, ''), offset: at, number });
    at = stop + 1;
  }
  return { lines, newline };
}

interface Guess {
  readonly style: CellStyle;
  readonly rows: readonly { line: Line; cells: string[] }[];
  readonly columns: number;
}

/** Splits every line one way and keeps the lines that are all numbers (a time as text is allowed in a cell). */
function guess(lines: readonly Line[], delimiter: Delimiter): Guess {
  const split = lines.map((line) => ({ line, cells: splitCells(line.text, delimiter) }));
  const decimalComma =
    delimiter !== ',' && split.some((s) => s.cells.some((c) => /^[-+]?\d*,\d+([eEdD][-+]?\d+)?$/.test(c)));
  const numeric = split.filter(
    ({ cells }) =>
      cells.some((c) => c !== '' && isNumber(c, decimalComma)) &&
      cells.every((c) => isNumber(c, decimalComma) || isDate(c)),
  );
  const counts = new Map<number, number>();
  for (const { cells } of numeric) counts.set(cells.length, (counts.get(cells.length) ?? 0) + 1);
  const columns = [...counts].sort((a, b) => b[1] - a[1]).at(0)?.[0] ?? 0;
  // One column with decimal commas cannot be told from two columns of whole numbers; the second is what is written more often.
  const rows = columns === 1 && decimalComma ? [] : numeric.filter(({ cells }) => cells.length === columns);
  const open = columns > 1 && rows.every(({ cells }) => cells.at(-1) === '');
  return { style: { delimiter, decimalComma }, rows, columns: open ? columns - 1 : columns };
}

function isNumber(cell: string, decimalComma: boolean): boolean {
  return cellValue(cell, decimalComma) !== undefined;
}

function isDate(cell: string): boolean {
  return /^\d{4}-\d\d-\d\d/.test(cell) && 'time' in readInstant(cell);
}

/** Rows of numbers among the data lines of a head, for recognising a text file by content. */
export function numericShare(head: Uint8Array, whole: boolean): { rows: number; lines: number } {
  const data = linesOf(head, whole).lines.filter((l) => l.text.trim() !== '' && !COMMENT.test(l.text));
  const rows = Math.max(0, ...DELIMITERS.map((d) => guess(data, d).rows.length));
  return { rows, lines: data.length };
}

/** Finds delimiter, decimal mark, header, column names and units, and "key: value" pairs in the first lines. */
export function findDialect(head: Uint8Array, whole: boolean, file: string): Dialect {
  if ((head[0] === 0xff && head[1] === 0xfe) || (head[0] === 0xfe && head[1] === 0xff))
    throw new UserError('text-encoding', `${file} is UTF-16 text. Save it as UTF-8.`, file);
  const { lines, newline } = linesOf(head, whole);
  const data = lines.filter((l) => l.text.trim() !== '' && !COMMENT.test(l.text));
  const best = DELIMITERS.map((d) => guess(data, d)).reduce((a, b) =>
    b.rows.length > a.rows.length || (b.rows.length === a.rows.length && b.columns > a.columns) ? b : a,
  );
  const first = best.rows.at(0)?.line;
  if (!first)
    throw new UserError(
      'no-numbers',
      `${file} has no line of numbers among its first ${lines.length}. Expected are columns of numbers separated by comma, semicolon, tab or blanks.`,
      file,
    );
  const above = lines.filter((l) => l.number < first.number && l.text.trim() !== '');
  const { names, units } = headerCells(above, best);
  return {
    ...best.style,
    columns: nameColumns(best.columns, names, units),
    dataOffset: first.offset,
    dataLine: first.number,
    newline,
    clues: above.flatMap((l) => cluesIn(l, file)),
    probe: best.rows.map((r) => r.cells),
    notes: best.style.decimalComma ? ['Numbers are written with a decimal comma.'] : [],
  };
}

/** Cells of the line that names the columns, and of a line of units below it. */
function headerCells(above: readonly Line[], best: Guess): { names: string[]; units: string[] } {
  const fitting = above.flatMap((l) => {
    const comment = COMMENT.test(l.text);
    const text = l.text.replace(COMMENT, '');
    const ways = comment ? [best.style.delimiter, ...DELIMITERS] : [best.style.delimiter];
    const cells = ways.map((d) => splitCells(text, d)).find((c) => c.length === best.columns);
    if (!cells || (comment && best.columns === 1 && /[:=]|\s/.test(text.trim()))) return [];
    return [{ cells, comment }];
  });
  const last = fitting.findLast((f) => !f.comment) ?? fitting.at(-1);
  const before = last ? fitting[fitting.indexOf(last) - 1] : undefined;
  const unitLine =
    before !== undefined &&
    last!.cells.some((c) => /^[[(]?(s|sec|seconds|ms|us|µs)[\])]?$/i.test(c)) &&
    before.cells.some((c) => meaningOf(c)?.meaning === 'time-axis');
  return unitLine ? { names: before.cells, units: last!.cells } : { names: last?.cells ?? [], units: [] };
}

function nameColumns(count: number, names: readonly string[], units: readonly string[]): TextColumn[] {
  const parts = Array.from({ length: count }, (_, k) => {
    const header = names.at(k) ?? '';
    const m = /^(.*?)\s*[[(]([^\])]*)[\])]$/.exec(header);
    const unit = (m ? m[2] : (units.at(k) ?? '').replace(/^[[(](.*)[\])]$/, '$1')).trim();
    return {
      header: units.length > 0 && unit !== '' ? `${header} (${unit})` : header,
      base: (m ? m[1] : header).trim(),
      unit,
    };
  });
  return parts.map(({ header, base, unit }, k) => {
    const twice = parts.filter((p) => p.base === base).length > 1;
    const name = base === '' ? `column ${k + 1}` : twice ? `${base} (column ${k + 1})` : base;
    return { name, header, ...(unit === '' ? {} : { unit }) };
  });
}

/** "sample rate: 4096 Hz", "fs=4096, t0=1400000000", "sampling rate 4096 Hz". */
function cluesIn(line: Line, file: string): Clue[] {
  const where = `line ${line.number} of ${file}`;
  const text = line.text.replace(/^\s*[#%]+\s*/, '');
  return text.split(/[,;]\s*(?=[A-Za-z][\w ]*\s*[:=])/).flatMap((part): Clue[] => {
    const m = /^([A-Za-z][\w .()[\]/-]*?)\s*[:=,;\t]\s*(.+?)\s*$/.exec(part);
    if (m && meaningOf(m[1]))
      return [{ name: m[1], value: m[2].replace(/^"(.*)"$/, '$1'), where, distance: 1 }];
    const n = /^([A-Za-z][A-Za-z _]*?)\s+([-+]?\d[\d.eE+-]*\s*(?:[kM]?Hz|m?s)?)$/.exec(part.trim());
    if (n && wordsOf(n[1]).length > 1 && meaningOf(n[1]))
      return [{ name: n[1], value: n[2], where, distance: 1 }];
    return [];
  });
}
