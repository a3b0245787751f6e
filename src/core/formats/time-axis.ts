import { UserError } from '../data/errors';
import type { GpsTime } from '../data/gps-time';
import type { Span } from '../data/spans';
import type { FittedTime } from './facts';
import type { Found } from './format';
import { readInstant, type Scalar } from './instant';
import type { TimeScale } from './meaning';
import { TimeTrack } from './time-track';

/** A column of time stamps in seconds. */
export interface Stamps {
  readonly count: number;
  /** Stamps `[from, to)` into `into`. */
  readonly read: (from: number, to: number, into: Float64Array) => void;
  /** For the user: "dataset /time". */
  readonly where: string;
  readonly scale?: TimeScale;
}

/** Rows that exist, each run placed on the even grid of samples. */
export interface TimeGrid {
  /** Samples from the first to the last stamp, gaps included. */
  readonly length: number;
  readonly runs: readonly Span[];
  /** Row of the first sample of each run. */
  readonly rows: readonly number[];
}

export interface TimeFit extends FittedTime {
  /** Present when the stamps jump and the rate is known. */
  readonly grid?: TimeGrid;
  readonly notes: readonly string[];
}

/** A reader of stamps whose values are multiplied to seconds. */
export function scaled(read: Stamps['read'], factor: number): Stamps['read'] {
  if (factor === 1) return read;
  return (from, to, into) => {
    read(from, to, into);
    for (let i = 0; i < to - from; i++) into[i] *= factor;
  };
}

/** Fits numeric stamps read in blocks. */
export function fitStamps(stamps: Stamps): TimeFit {
  const block = new Float64Array(Math.min(stamps.count, 1 << 16));
  stamps.read(0, 1, block);
  const origin = block[0];
  const tail = new Float64Array(Math.min(stamps.count, 4096));
  stamps.read(stamps.count - tail.length, stamps.count, tail);
  const largest = Math.max(Math.abs(origin), Math.abs(tail.at(-1)!));
  const resolution = ulp(largest, looksSingle(tail) ? 24 : 53);
  const track = new TimeTrack(resolution, (row) => `row ${row} of ${stamps.where}`);
  for (let at = 0; at < stamps.count; at += block.length) {
    const n = Math.min(block.length, stamps.count - at);
    stamps.read(at, at + n, block);
    for (let i = 0; i < n; i++) track.push(block[i] - origin);
  }
  track.finish();
  const scale = stamps.scale ? { scale: stamps.scale } : {};
  return fitTrack(track, { first: origin, resolution, where: stamps.where, ...scale });
}

/** True when stamps went through float32: every one fits 24 bits, and rounding made the steps unequal or zero. */
export function looksSingle(stamps: Float64Array): boolean {
  if (!stamps.every((t) => Math.fround(t) === t)) return false;
  const step = stamps[1] - stamps[0];
  return !(step > 0) || stamps.some((t, i) => i > 0 && t - stamps[i - 1] !== step);
}

/** Spacing of floats with `digits` significant bits near `x`. */
export function ulp(x: number, digits: number): number {
  return x === 0 ? 0 : 2 ** (Math.floor(Math.log2(Math.abs(x))) - digits + 1);
}

/**
 * Rate, start and grid of a finished track. The rate is the whole-span fit of the longest even stretch, never a single
 * step: stamps with 6 decimals step by 0.000244 s, which would give 4098 Hz for 4096 Hz. Where the resolution of the
 * stamps leaves exactly one whole number of Hz (or of seconds) possible, that is taken. A rate known to worse than 1e-4
 * is not given at all, so that the user is asked.
 */
export function fitTrack(
  track: TimeTrack,
  column: { first: Scalar; resolution: number; where: string; scale?: TimeScale },
): TimeFit {
  const notes: string[] = [];
  if (track.count < 2) return { notes };
  if (track.uneven) {
    return { notes: [`The steps of ${column.where} are uneven: no rate can be taken from it.`] };
  }
  const longest = track.stretches.reduce((a, b) => (b.count > a.count ? b : a));
  const rate = wholeSpanRate(longest.count, longest.last - longest.first, column, notes);
  const start = startOf(column, rate?.value ?? 1 / track.step, notes);
  if (!rate) return { ...(start ? { start } : {}), notes };
  const grid = track.stretches.length > 1 ? gridOf(track, rate.value, column, notes) : undefined;
  return { rate, ...(start ? { start } : {}), ...(grid ? { grid } : {}), notes };
}

function wholeSpanRate(
  count: number,
  seconds: number,
  column: { resolution: number; where: string },
  notes: string[],
): Found<number> | undefined {
  const fit = (count - 1) / seconds;
  if (!(fit > 0) || !Number.isFinite(fit)) {
    notes.push(`The stamps of ${column.where} do not rise: no rate can be taken from them.`);
    return undefined;
  }
  const relative = column.resolution / seconds + 1e-12;
  const where = `whole-span fit of ${column.where} (${count} stamps over ${Number(seconds.toPrecision(9))} s)`;
  const whole = fit >= 1 ? Math.round(fit) : 1 / Math.round(1 / fit);
  const off = Math.abs(fit / whole - 1);
  const single = relative * Math.max(fit, 1 / fit) < 0.5;
  if (off <= relative && single) {
    const said = off > 1e-9 ? `, ${fit} Hz taken as ${whole} Hz` : '';
    return { value: whole, where: where + said };
  }
  if (off <= 1e-9 || relative <= 1e-4) {
    if (relative > 1e-6)
      notes.push(
        `The stamps of ${column.where} have a resolution of ${column.resolution} s: the rate is uncertain by ${(100 * relative).toPrecision(2)} %.`,
      );
    return { value: off <= 1e-9 ? whole : fit, where };
  }
  notes.push(
    `The stamps of ${column.where} are too coarse for a rate: their resolution is ${column.resolution} s, the fit ${fit.toPrecision(4)} Hz is uncertain by ${(100 * relative).toPrecision(2)} %. Give the rate.`,
  );
  return undefined;
}

function startOf(
  column: { first: Scalar; resolution: number; where: string; scale?: TimeScale },
  rate: number,
  notes: string[],
): Found<GpsTime> | undefined {
  const read = readInstant(column.first, column.scale);
  if ('relative' in read) {
    notes.push(
      `The stamps of ${column.where} begin at ${read.value} s: a time since something the file does not name.`,
    );
    return undefined;
  }
  if ('rejected' in read) return undefined;
  if (column.resolution >= 1) {
    notes.push(
      `The stamps of ${column.where} have a resolution of ${column.resolution} s: the start is not taken from them.`,
    );
    return undefined;
  }
  if (column.resolution * rate > 0.5)
    notes.push(`The start is known to ${column.resolution} s only, the resolution of ${column.where}.`);
  return { value: read.time, where: `first stamp of ${column.where}, ${read.how}` };
}

function gridOf(
  track: TimeTrack,
  rate: number,
  column: { resolution: number; where: string },
  notes: string[],
): TimeGrid {
  const runs: Span[] = [];
  let missing = 0;
  let worst = 0;
  for (const s of track.stretches) {
    const exact = s.first * rate;
    const from = Math.round(exact);
    worst = Math.max(worst, Math.abs(exact - from) - column.resolution * rate);
    const end = runs.at(-1)?.to ?? 0;
    if (from < end)
      throw new UserError(
        'time-goes-back',
        `${column.where}: the rows from ${s.row} on overlap the rows before by ${end - from} samples at ${rate} Hz. Remove the overlap.`,
      );
    missing += from - end;
    runs.push({ from, to: from + s.count });
  }
  const length = runs.at(-1)!.to;
  if (length > Math.max(1e9, 1000 * track.count))
    throw new UserError(
      'time-gap-huge',
      `${column.where} jumps so far that ${missing} samples would be missing between ${track.count} rows. Split the file at the jump.`,
    );
  notes.push(
    `${column.where} has ${runs.length - 1} ${runs.length === 2 ? 'gap' : 'gaps'} (${missing} samples, ${missing / rate} s): missing samples read as NaN and are never filled.`,
  );
  if (worst > 0.1)
    notes.push(
      `After a gap ${column.where} resumes ${worst.toFixed(2)} samples off the even grid; rows are placed at the nearest sample.`,
    );
  return { length, runs, rows: track.stretches.map((s) => s.row) };
}

/** Reads samples of the grid from a reader of rows; samples without a row become NaN. */
export function readOnGrid(
  grid: TimeGrid,
  rows: (from: number, to: number, into: Float64Array) => void,
): (from: number, to: number, into: Float64Array) => void {
  return (from, to, into) => {
    into.fill(NaN, 0, to - from);
    for (let k = firstRun(grid.runs, from); k < grid.runs.length && grid.runs[k].from < to; k++) {
      const run = grid.runs[k];
      const a = Math.max(from, run.from);
      const b = Math.min(to, run.to);
      const row = grid.rows[k] + a - run.from;
      if (b > a) rows(row, row + b - a, into.subarray(a - from, b - from));
    }
  };
}

/** Index of the first run that ends after `at`. */
function firstRun(runs: readonly Span[], at: number): number {
  let low = 0;
  let high = runs.length;
  while (low < high) {
    const mid = (low + high) >> 1;
    if (runs[mid].to > at) high = mid;
    else low = mid + 1;
  }
  return low;
}
