import { UserError } from '../data/errors';

const COMMENT = /^\s*(?:[#%;!]|\/\/)/;

/** Numbers of a file in columns of equal length; what any reader of such a file gives. */
export interface NumberColumns {
  /** For messages and labels. */
  readonly name: string;
  readonly columns: readonly Float64Array[];
}

/**
 * Columns of numbers separated by blanks, commas, semicolons or tabs. Lines that start with #, %, ;, ! or // are comments;
 * one line of column names may come first.
 *
 * @throws UserError naming file and line: not a number, another count of columns than the first row, fewer than `least` rows
 */
export function parseColumns(text: string, name: string, least = 4): NumberColumns {
  const rows: number[][] = [];
  let header = false;
  const lines = text.replace(/^\uFEFF/, '').split(/\r\n|\r|\n/);
  for (const [at, raw] of lines.entries()) {
    if (raw.trim() === '' || COMMENT.test(raw)) continue;
    const cells = raw.trim().split(/\s*[,;]\s*|\s+/);
    const values = cells.map((c) => (c === '' ? NaN : Number(c)));
    if (!header && rows.length === 0 && values.every(Number.isNaN)) {
      header = true;
      continue;
    }
    const bad = values.findIndex((v) => !Number.isFinite(v));
    const where = `${name}:${at + 1}`;
    if (bad >= 0)
      throw new UserError(
        'file-number',
        `${name}, line ${at + 1}: "${cells[bad]}" is not a finite number; write it as 1.5e-23`,
        where,
      );
    const count = rows.at(0)?.length ?? values.length;
    if (values.length !== count)
      throw new UserError(
        'file-columns',
        `${name}, line ${at + 1}: ${values.length} values, but the first row has ${count}`,
        where,
      );
    rows.push(values);
  }
  if (rows.length < least)
    throw new UserError(
      'file-short',
      `${name} has ${rows.length} rows of numbers; a waveform needs at least ${least}`,
      name,
    );
  return { name, columns: rows[0].map((_, c) => Float64Array.from(rows, (r) => r[c])) };
}

/** @throws UserError when a column does not rise from row to row */
export function checkRising(x: Float64Array, name: string, what: string): void {
  for (let i = 1; i < x.length; i++)
    if (!(x[i] > x[i - 1]))
      throw new UserError(
        'file-order',
        `${name}: ${what} ${x[i]} of row ${i + 1} does not rise above ${x[i - 1]}; sort the rows by ${what}`,
        name,
      );
}
