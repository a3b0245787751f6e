import type { ByteSource } from './format';
import { findCell, isDataLine, type CellBounds } from './text-cells';
import type { Dialect } from './text-dialect';
import { eachLine } from './text-lines';
import { StampReader, type TimeColumn } from './text-time';
import { TimeTrack } from './time-track';

/** Rows between two places of the index. */
export const INDEX_ROWS = 1024;

/** Where every 1024th row begins, so that a span is found without reading what lies before it. */
export interface TextIndex {
  readonly rows: number;
  /** Offset and 1-based line number of row `1024 k`. */
  readonly offsets: readonly number[];
  readonly lines: readonly number[];
  readonly track?: TimeTrack;
}

/** Rows whose line numbers are kept for messages of the time track, which judges them late. */
const LATE_ROWS = 1024;

/** Goes through the file once: counts rows, notes places, follows the time column. */
export function indexText(source: ByteSource, dialect: Dialect, time: TimeColumn | undefined): TextIndex {
  const offsets: number[] = [];
  const lines: number[] = [];
  const late: number[] = [];
  let rows = 0;
  let line = dialect.dataLine - 1;
  const track = time
    ? new TimeTrack(time.resolution, (row) => `${source.name}, line ${late[row] ?? line}`)
    : undefined;
  const stamps = time ? new StampReader(time.factor) : undefined;
  const cell: CellBounds = { from: 0, to: 0, found: true };
  eachLine(source, dialect.dataOffset, dialect.newline, (bytes, from, to, offset) => {
    line++;
    if (!isDataLine(bytes, from, to)) return true;
    if (rows % INDEX_ROWS === 0) {
      offsets.push(offset);
      lines.push(line);
    }
    if (rows < LATE_ROWS) late.push(line);
    if (track && stamps && time)
      track.push(stamps.read(bytes, findCell(bytes, from, to, time.column, dialect.delimiter, cell)));
    rows++;
    return true;
  });
  track?.finish();
  return { rows, offsets, lines, ...(track ? { track } : {}) };
}
