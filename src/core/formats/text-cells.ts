/** Numbers in text cells, and how a line is cut into cells. */

export type Delimiter = ',' | ';' | '\t' | ' ';

export interface CellStyle {
  /** A blank stands for any run of blanks and tabs. */
  readonly delimiter: Delimiter;
  readonly decimalComma: boolean;
}

const BLANK = 32;
const TAB = 9;
const RETURN = 13;
const QUOTE = 34;

/** Cells of one line, trimmed and without quotes. */
export function splitCells(line: string, delimiter: Delimiter): string[] {
  const cells = delimiter === ' ' ? line.trim().split(/\s+/) : line.split(delimiter);
  return cells.map((c) =>
    c
      .trim()
      .replace(/^"(.*)"$/, '$1')
      .trim(),
  );
}

const NUMBER = /^[-+]?(\d+\.?\d*|\.\d+)([eEdD][-+]?\d+)?$/;
const NOT_A_NUMBER = /^[-+]?(nan|na|n\/a|null|none|missing|-|nan\(ind\)|1\.#(ind|qnan)\d*)$/i;
const INFINITE = /^([-+]?)(inf|infinity|1\.#inf\d*)$/i;

/** Value of a cell: NaN for an empty one or one that says so, undefined when it is text. */
export function cellValue(cell: string, decimalComma: boolean): number | undefined {
  const text = decimalComma ? cell.replace(',', '.') : cell;
  if (NUMBER.test(text)) return Number(text.replace(/[dD]/, 'e'));
  if (text === '' || NOT_A_NUMBER.test(text)) return NaN;
  const infinite = INFINITE.exec(text);
  return infinite ? (infinite[1] === '-' ? -Infinity : Infinity) : undefined;
}

/** Bounds of one cell in the bytes of a line. */
export interface CellBounds {
  from: number;
  to: number;
  /** False when the line has fewer cells. */
  found: boolean;
}

/** Finds cell `column` of the line `[from, to)` without blanks, line end and quotes around it; reuses `out`. */
export function findCell(
  bytes: Uint8Array,
  from: number,
  to: number,
  column: number,
  delimiter: Delimiter,
  out: CellBounds,
): CellBounds {
  let a = from;
  let b = to;
  out.found = true;
  if (delimiter === ' ') {
    while (a < to && isBlank(bytes[a])) a++;
    for (let k = 0; k < column; k++) {
      while (a < to && !isBlank(bytes[a])) a++;
      while (a < to && isBlank(bytes[a])) a++;
    }
    out.found = a < to;
    b = a;
    while (b < to && !isBlank(bytes[b])) b++;
  } else {
    const code = delimiter.charCodeAt(0);
    for (let k = 0; k < column; k++) {
      while (a < to && bytes[a] !== code) a++;
      if (a === to) out.found = false;
      else a++;
    }
    b = a;
    while (b < to && bytes[b] !== code) b++;
    while (a < b && isBlank(bytes[a])) a++;
    while (b > a && isBlank(bytes[b - 1])) b--;
  }
  if (b - a >= 2 && bytes[a] === QUOTE && bytes[b - 1] === QUOTE) {
    a++;
    b--;
  }
  out.from = a;
  out.to = b;
  return out;
}

function isBlank(code: number): boolean {
  return code === BLANK || code === TAB || code === RETURN;
}

const HASH = 35;
const PERCENT = 37;

/** True when the line `[from, to)` holds data: not blank and not a comment (#, %). */
export function isDataLine(bytes: Uint8Array, from: number, to: number): boolean {
  let a = from;
  while (a < to && isBlank(bytes[a])) a++;
  return a < to && bytes[a] !== HASH && bytes[a] !== PERCENT;
}
