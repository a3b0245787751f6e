import { UserError } from '../data/errors';
import { latin1 } from './bytes';
import type { ByteSource } from './format';
import { cellValue, findCell, isDataLine, type CellBounds } from './text-cells';
import type { Dialect } from './text-dialect';
import { INDEX_ROWS, type TextIndex } from './text-index';
import { eachLine } from './text-lines';

/** Reads rows `[from, to)` of one column; text where a number should be is a UserError naming file and line. */
export function columnReader(
  source: ByteSource,
  dialect: Dialect,
  index: TextIndex,
  column: number,
): (from: number, to: number, into: Float64Array) => void {
  const { delimiter, decimalComma } = dialect;
  const cell: CellBounds = { from: 0, to: 0, found: true };
  return (from, to, into) => {
    const place = Math.floor(from / INDEX_ROWS);
    let row = place * INDEX_ROWS;
    let line = index.lines[place] - 1;
    let text = '';
    eachLine(
      source,
      index.offsets[place],
      dialect.newline,
      (bytes, a, b) => {
        line++;
        if (!isDataLine(bytes, a, b)) return true;
        if (row >= from) {
          findCell(bytes, a, b, column, delimiter, cell);
          if (!cell.found) throw shortRow(source.name, line, column, dialect);
          const value = numberOf(text.slice(cell.from, cell.to), decimalComma);
          if (value === undefined)
            throw textCell(source.name, line, column, text.slice(cell.from, cell.to), dialect);
          into[row - from] = value;
        }
        return ++row < to;
      },
      (bytes) => {
        text = latin1(bytes);
      },
    );
    if (row < to)
      throw new UserError(
        'file-changed',
        `${source.name} has fewer rows than when it was opened. Open it again.`,
        source.name,
      );
  };
}

/** Plain numbers the fast way; `Number` alone would also take "" and "0x10". */
function numberOf(cell: string, decimalComma: boolean): number | undefined {
  if (!decimalComma && cell.length > 0) {
    const value = Number(cell);
    const second = cell.length > 2 ? cell.charCodeAt(1) | 32 : 0;
    if (value - value === 0 && second !== 120 && second !== 98 && second !== 111) return value;
  }
  return cellValue(cell, decimalComma);
}

function textCell(file: string, line: number, column: number, text: string, dialect: Dialect): UserError {
  const shown = text.length > 40 ? `${text.slice(0, 40)}…` : text;
  return new UserError(
    'cell-not-number',
    `${file}, line ${line}: "${shown}" in column ${column + 1} (${dialect.columns[column].name}) is not a number. Correct the cell or leave it empty.`,
    `${file}, line ${line}`,
  );
}

function shortRow(file: string, line: number, column: number, dialect: Dialect): UserError {
  return new UserError(
    'row-too-short',
    `${file}, line ${line} has no column ${column + 1} (${dialect.columns[column].name}), ${dialect.columns.length} columns are expected. The file may be cut short; correct or remove the line.`,
    `${file}, line ${line}`,
  );
}
