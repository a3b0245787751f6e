import { gpsTime, secondsBetween, type GpsTime } from '../data/gps-time';
import type { Found } from './format';
import { readInstant, type Scalar } from './instant';
import { meaningOf, wordsOf, type Meaning, type NameMeaning, type TimeScale } from './meaning';

/** A named value near a channel: an attribute, a scalar beside it, a key of a sidecar. */
export interface Clue {
  readonly name: string;
  readonly value: Scalar | readonly Scalar[];
  /** For the user: "attribute Spacing of /strain". */
  readonly where: string;
  /** 0 on the channel itself, larger for what is farther away. */
  readonly distance: number;
}

/** What a fit of time stamps says, see time-axis.ts. */
export interface FittedTime {
  readonly rate?: Found<number>;
  readonly start?: Found<GpsTime>;
}

export interface SeriesFacts {
  readonly rate?: Found<number>;
  readonly start?: Found<GpsTime>;
  readonly unit?: Found<string>;
  readonly notes: readonly string[];
}

interface Candidate extends Clue {
  readonly means: NameMeaning;
}

/**
 * Rate, start and unit of a channel from the names and values around it. The nearest clear clue wins; anything that
 * contradicts it becomes a note. Order for the rate: attributes and scalars, then the fit of a time column.
 * `axis` picks the entry of a value that has one per axis of the dataset.
 */
export function factsFrom(
  clues: readonly Clue[],
  channel: { name: string; length: number; axis?: number },
  fit: FittedTime = {},
): SeriesFacts {
  const notes: string[] = [];
  const candidates = clues.flatMap((c) => {
    const means = meaningOf(c.name);
    return means ? [{ ...c, means }] : [];
  });
  const rate = findRate(candidates, channel, fit, notes);
  const start = findStart(candidates, fit, notes);
  const unit = findUnit(candidates, channel.name);
  if (rate) checkExtent(candidates, channel, rate, start, notes);
  for (const c of ranked(candidates, 'scale').filter((x) => x.distance === 0 && numberOf(x.value) !== 1))
    notes.push(`${c.where} is ${show(c.value)}: it is not applied, samples are as stored.`);
  return { ...(rate ? { rate } : {}), ...(start ? { start } : {}), ...(unit ? { unit } : {}), notes };
}

function ranked(candidates: readonly Candidate[], ...meanings: Meaning[]): Candidate[] {
  const cost = (c: Candidate): number =>
    c.distance + (c.means.sure === 1 ? 2 : c.means.sure === 2 ? 0.25 : 0);
  return candidates.filter((c) => meanings.includes(c.means.meaning)).sort((a, b) => cost(a) - cost(b));
}

const SUFFIX: Readonly<Record<string, number>> = {
  hz: 1,
  khz: 1e3,
  mhz: 1e6,
  s: 1,
  sec: 1,
  seconds: 1,
  second: 1,
  ms: 1e-3,
  us: 1e-6,
  ns: 1e-9,
};

/** Number of a value such as 4096, "4096", "0.25 ms" or a list with one entry per axis; NaN when it is none. */
function numberOf(value: Clue['value'], axis?: number): number {
  if (Array.isArray(value)) {
    const list = value as readonly Scalar[];
    const one = list.length === 1 ? list[0] : axis === undefined ? undefined : list[axis];
    return one === undefined ? NaN : numberOf(one);
  }
  if (typeof value === 'string') {
    const m = /^\s*([-+]?(?:\d+\.?\d*|\.\d+)(?:e[-+]?\d+)?)\s*([a-zµ]*)\s*$/i.exec(value);
    if (!m) return NaN;
    return Number(m[1]) * (m[2] === '' ? 1 : (SUFFIX[m[2].toLowerCase().replace('µ', 'u')] ?? NaN));
  }
  return typeof value === 'boolean' ? NaN : Number(value);
}

function show(value: Clue['value']): string {
  return Array.isArray(value) ? `[${(value as readonly Scalar[]).map(String).join(', ')}]` : String(value);
}

/** 1/spacing of a decimal such as 0.000244140625 is exact up to rounding of the last bit; that bit is no fact. */
function rateOfSpacing(dt: number): number {
  const rate = 1 / dt;
  const whole = Math.round(rate);
  return whole > 0 && Math.abs(rate - whole) < 1e-9 * rate ? whole : rate;
}

function findRate(
  candidates: readonly Candidate[],
  channel: { length: number; axis?: number },
  fit: FittedTime,
  notes: string[],
): Found<number> | undefined {
  const found: Found<number>[] = [];
  for (const c of ranked(candidates, 'rate', 'spacing')) {
    const value = numberOf(c.value, channel.axis) * c.means.factor;
    if (Number.isNaN(value) && typeof c.value === 'object') continue;
    if (!(value > 0) || !Number.isFinite(value)) {
      notes.push(`${c.where} is ${show(c.value)}: not usable as a ${c.means.meaning}, ignored.`);
      continue;
    }
    const spacing = c.means.meaning === 'spacing';
    found.push({
      value: spacing ? rateOfSpacing(value) : value,
      where: `${c.where}${spacing ? ` (spacing ${value} s)` : ''}${c.means.sure === 1 ? ', taken for the sample rate by its name alone' : ''}`,
    });
  }
  if (fit.rate) found.push(fit.rate);
  const best = found.at(0);
  if (!best) return undefined;
  for (const other of found.slice(1)) {
    const off = Math.abs(other.value / best.value - 1);
    if (off > 1e-6)
      notes.push(
        `Sample rates disagree: ${best.value} Hz from ${best.where}, ${other.value} Hz from ${other.where}. The first is used; give the rate to overrule it.`,
      );
  }
  const whole = Math.round(best.value);
  const off = Math.abs(best.value / whole - 1);
  if (found.length === 1 && off > 0 && off < 1e-4)
    notes.push(
      `The rate ${best.value} Hz is nearly ${whole} Hz: if the file rounds it, give the rate ${whole}.`,
    );
  return best;
}

/** Time scale that words around a channel state, for example a label "GPS time". */
function statedScale(candidates: readonly Candidate[]): TimeScale | undefined {
  for (const c of ranked(candidates, 'time-label', 'time-unit')) {
    if (typeof c.value !== 'string') continue;
    const words = wordsOf(c.value);
    if (words.includes('gps')) return 'gps';
    if (words.includes('unix') || words.includes('posix')) return 'unix';
  }
  return undefined;
}

function findStart(
  candidates: readonly Candidate[],
  fit: FittedTime,
  notes: string[],
): Found<GpsTime> | undefined {
  const around = statedScale(candidates);
  const found: Found<GpsTime>[] = [];
  let relative: string | undefined;
  for (const c of ranked(candidates, 'start', 'time-axis')) {
    const value = Array.isArray(c.value)
      ? c.value.length === 1
        ? (c.value[0] as Scalar)
        : undefined
      : c.value;
    if (value === undefined) continue;
    const scaled = c.means.factor === 1 ? (value as Scalar) : Number(value) * c.means.factor;
    const read = readInstant(scaled, c.means.scale ?? around);
    if ('relative' in read) {
      if (c.means.meaning === 'start')
        relative ??= `${c.where} is ${read.value}: a time since something the file does not name, so the start is not known from it.`;
    } else if ('rejected' in read) {
      if (c.means.meaning === 'start') notes.push(`${c.where} ${read.rejected}: ignored.`);
    } else {
      const nanos = candidates.find((n) => n.means.meaning === 'start-nanos' && n.distance === c.distance);
      const extra = nanos ? numberOf(nanos.value) : 0;
      const exact =
        read.time.nanos === 0 && extra > 0 && extra < 1e9 ? gpsTime(read.time.seconds, extra) : read.time;
      const also = exact === read.time ? '' : ` and ${nanos!.where}`;
      found.push({ value: exact, where: `${c.where}${also}, ${read.how}` });
    }
  }
  if (fit.start) found.push(fit.start);
  const best = found.at(0);
  if (!best) {
    if (relative) notes.push(relative);
    return undefined;
  }
  const other = found.slice(1).find((f) => Math.abs(secondsBetween(f.value, best.value)) > 1e-3);
  if (other)
    notes.push(
      `Start times disagree by ${secondsBetween(other.value, best.value)} s: ${best.where} is used, not ${other.where}. Give the start to overrule it.`,
    );
  return best;
}

const NO_UNIT = /^(|-|none|n\/?a|unknown|arb(itrary)?( units?)?)$/i;

function findUnit(candidates: readonly Candidate[], name: string): Found<string> | undefined {
  const near = ranked(candidates, 'unit').filter((c) => c.distance <= 1 && typeof c.value === 'string');
  for (const c of near) {
    const text = String(c.value).trim();
    if (!NO_UNIT.test(text)) return { value: text, where: c.where };
  }
  const empty = near.length > 0 ? `${near[0].where} is empty; ` : '';
  for (const c of ranked(candidates, 'label')) {
    if (typeof c.value === 'string' && saysStrain(c.value))
      return { value: 'strain', where: `${empty}${c.where} says "${c.value}"` };
  }
  if (saysStrain(name)) return { value: 'strain', where: `${empty}name of the channel` };
  return undefined;
}

function saysStrain(text: string): boolean {
  return wordsOf(text).includes('strain');
}

function checkExtent(
  candidates: readonly Candidate[],
  channel: { length: number },
  rate: Found<number>,
  start: Found<GpsTime> | undefined,
  notes: string[],
): void {
  const seconds = channel.length / rate.value;
  const slack = Math.max(1.5 / rate.value, 1e-6 * seconds);
  const duration = ranked(candidates, 'duration').at(0);
  const said = duration ? numberOf(duration.value) * duration.means.factor : NaN;
  if (duration && Math.abs(said - seconds) > slack)
    notes.push(
      `${duration.where} says ${said} s, but ${channel.length} samples at ${rate.value} Hz are ${seconds} s.`,
    );
  const count = ranked(candidates, 'count').find((c) => c.means.sure === 3 && c.distance === 0);
  if (count && numberOf(count.value) !== channel.length)
    notes.push(`${count.where} says ${show(count.value)} samples, but there are ${channel.length}.`);
  const end = ranked(candidates, 'end').at(0);
  if (!end || !start || typeof end.value === 'object') return;
  const read = readInstant(end.value, end.means.scale ?? statedScale(candidates));
  if (!('time' in read)) return;
  const span = secondsBetween(read.time, start.value);
  if (Math.abs(span - seconds) > slack)
    notes.push(`${end.where} is ${span} s after the start, but the samples last ${seconds} s.`);
}
