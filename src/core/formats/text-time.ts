import { secondsBetween, type GpsTime } from '../data/gps-time';
import { latin1 } from './bytes';
import { readInstant } from './instant';
import { meaningOf, type TimeScale } from './meaning';
import { cellValue, type CellBounds } from './text-cells';
import type { Dialect } from './text-dialect';
import { looksSingle, ulp } from './time-axis';

/** The column of a text file that holds time. */
export interface TimeColumn {
  readonly column: number;
  /** For the user: "column 1 (time) of run.csv". */
  readonly where: string;
  /** Multiplies to seconds. */
  readonly factor: number;
  readonly scale?: TimeScale;
  /** Seconds. */
  readonly resolution: number;
  /** Text of the first stamp. */
  readonly first: string;
  readonly notes: readonly string[];
}

const FEWEST = 3;

/**
 * The time column: one whose header means time, else the first of several columns when it rises in even steps from row
 * to row (then a note says so).
 */
export function findTimeColumn(dialect: Dialect, file: string): TimeColumn | undefined {
  if (dialect.columns.length < 2) return undefined;
  const named = dialect.columns.findIndex((c) => timeMeaning(c.header) !== undefined);
  const column = named >= 0 ? named : dialect.columns.every((c) => c.header === '') ? 0 : -1;
  if (column < 0) return undefined;
  const cells = dialect.probe.map((r) => r[column]);
  const dates = cells.every((c) => cellValue(c, dialect.decimalComma) === undefined);
  const values = Float64Array.from(cells, (c) => cellValue(c, dialect.decimalComma) ?? NaN);
  if (named < 0 && !dates && !risesEvenly(values)) return undefined;
  const means = timeMeaning(dialect.columns[column].header);
  const factor = dates ? 1 : (means?.factor ?? 1);
  const title = dialect.columns[column].header;
  const digits = Math.max(
    0,
    ...cells.map((c) => (dates ? (/[.,](\d+)/.exec(c)?.[1].length ?? 0) : decimals(c))),
  );
  const largest = Math.max(...values.map(Math.abs).filter(Number.isFinite), 0);
  const float = dates ? 1e-9 : ulp(largest, looksSingle(values) ? 24 : 53);
  const scale = means?.scale ?? (dates ? 'utc' : undefined);
  return {
    column,
    where: `column ${column + 1}${title === '' ? '' : ` (${title})`} of ${file}`,
    factor,
    ...(scale ? { scale } : {}),
    resolution: factor * Math.max(10 ** -digits, float),
    first: cells[0].replace(',', '.'),
    notes: named < 0 ? ['Column 1 is taken for time because it rises in even steps.'] : [],
  };
}

function timeMeaning(header: string): { factor: number; scale?: TimeScale } | undefined {
  const means = meaningOf(header);
  return means?.meaning === 'time-axis' && !/^[xh]$/i.test(header) ? means : undefined;
}

function risesEvenly(values: Float64Array): boolean {
  if (values.length < FEWEST) return false;
  const steps = Array.from(values.subarray(1), (v, i) => v - values[i]);
  const median = [...steps].sort((a, b) => a - b)[steps.length >> 1];
  const even = steps.filter((d) => Math.abs(d - median) <= 0.5 * median);
  return median > 0 && steps.every((d) => d > 0) && even.length >= 0.9 * steps.length;
}

/** Digits after the decimal mark, the exponent taken into account. */
function decimals(cell: string): number {
  const m = /^[-+]?\d*[.,]?(\d*)(?:[eEdD]([-+]?\d+))?$/.exec(cell);
  return m ? m[1].length - Number(m.at(2) ?? 0) : 0;
}

const ZERO = 48;
const DOT = 46;
const COMMA = 44;
const MINUS = 45;
const PLUS = 43;

/**
 * Reads stamps relative to the first one. Whole and fraction are kept apart, so that GPS seconds with nine decimals do
 * not lose the last three, as one float64 would. NaN where the cell is no time.
 */
export class StampReader {
  #origin: { whole: number; fraction: number } | undefined;
  #date: GpsTime | undefined;
  readonly #factor: number;

  constructor(factor: number) {
    this.#factor = factor;
  }

  read(bytes: Uint8Array, cell: CellBounds): number {
    let at = cell.from;
    const negative = bytes[at] === MINUS;
    if (negative || bytes[at] === PLUS) at++;
    let whole = 0;
    let digits = 0;
    for (; at < cell.to && isDigit(bytes[at]); at++, digits++) whole = whole * 10 + bytes[at] - ZERO;
    let fraction = 0;
    if (at < cell.to && (bytes[at] === DOT || bytes[at] === COMMA)) {
      let divisor = 1;
      for (at++; at < cell.to && isDigit(bytes[at]); at++, digits++) {
        if (divisor >= 1e15) continue;
        fraction = fraction * 10 + bytes[at] - ZERO;
        divisor *= 10;
      }
      fraction /= divisor;
    }
    if (at < cell.to || digits === 0) return this.#slow(latin1(bytes.subarray(cell.from, cell.to)));
    return this.#relative(negative ? -whole : whole, negative ? -fraction : fraction);
  }

  #relative(whole: number, fraction: number): number {
    this.#origin ??= { whole, fraction };
    return (whole - this.#origin.whole + (fraction - this.#origin.fraction)) * this.#factor;
  }

  #slow(text: string): number {
    const value = cellValue(text.replace(',', '.'), false);
    if (value !== undefined) {
      if (!Number.isFinite(value)) return NaN;
      const whole = Math.floor(value);
      return this.#relative(whole, value - whole);
    }
    const read = readInstant(text, 'utc');
    if (!('time' in read)) return NaN;
    this.#date ??= read.time;
    return secondsBetween(read.time, this.#date);
  }
}

function isDigit(code: number): boolean {
  return code >= ZERO && code < ZERO + 10;
}
