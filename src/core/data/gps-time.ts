import { LEAP_SECONDS } from './leap-seconds';

declare const gps: unique symbol;

/**
 * An instant of GPS time: whole seconds since 1980-01-06T00:00:00Z plus nanoseconds in [0, 1e9).
 * Two integers, because a float64 of GPS seconds resolves only 0.2 µs and cannot keep sample exactness.
 */
export type GpsTime = { readonly seconds: number; readonly nanos: number } & { readonly [gps]: true };

const NANO = 1_000_000_000;

/** Builds a GPS time; nanoseconds outside [0, 1e9) are carried. Throws on values that are not finite. */
export function gpsTime(seconds: number, nanos = 0): GpsTime {
  if (!Number.isFinite(seconds) || !Number.isFinite(nanos)) throw new RangeError('a GPS time must be finite');
  const whole = Math.floor(seconds);
  const n = Math.round((seconds - whole) * NANO) + Math.round(nanos);
  const carry = Math.floor(n / NANO);
  return { seconds: whole + carry, nanos: n - carry * NANO } as GpsTime;
}

/** Reads "1400000128.123456789" (exact) or a number (as exact as float64 is). Throws with the text in the message. */
export function parseGps(text: string | number): GpsTime {
  if (typeof text === 'number') return gpsTime(text);
  const m = /^\s*(-?)(\d{1,12})(?:\.(\d{0,9})\d*)?\s*$/.exec(text);
  if (!m) throw new RangeError(`"${text}" is not a GPS time: write seconds as 1400000000 or "1400000000.25"`);
  const nanos = Number((m.at(3) ?? '').padEnd(9, '0'));
  return m[1] === '-' ? gpsTime(-Number(m[2]), -nanos) : gpsTime(Number(m[2]), nanos);
}

/** Shortest exact decimal text, for example "1400000128.25". */
export function formatGps(t: GpsTime): string {
  if (t.seconds < 0 && t.nanos > 0) {
    const frac = String(NANO - t.nanos)
      .padStart(9, '0')
      .replace(/0+$/, '');
    return `-${String(-t.seconds - 1)}.${frac}`;
  }
  const frac = String(t.nanos).padStart(9, '0').replace(/0+$/, '');
  return frac === '' ? String(t.seconds) : `${String(t.seconds)}.${frac}`;
}

/** Nearest float64 of GPS seconds: for drawing only, loses sample exactness. */
export function lossySeconds(t: GpsTime): number {
  return t.seconds + t.nanos / NANO;
}

/** `a − b` in seconds; exact to float64 for spans a file can have. */
export function secondsBetween(a: GpsTime, b: GpsTime): number {
  return a.seconds - b.seconds + (a.nanos - b.nanos) / NANO;
}

export function addSeconds(t: GpsTime, dt: number): GpsTime {
  const whole = Math.floor(dt);
  return gpsTime(t.seconds + whole, t.nanos + (dt - whole) * NANO);
}

/** Time of sample `n` of a series starting at `t`; exact to a nanosecond however long the series is. */
export function addSamples(t: GpsTime, n: number, rate: number): GpsTime {
  const whole = Math.floor(n / rate);
  return gpsTime(t.seconds + whole, t.nanos + ((n - whole * rate) / rate) * NANO);
}

export function compareGps(a: GpsTime, b: GpsTime): number {
  return a.seconds - b.seconds || a.nanos - b.nanos;
}

/** Leap seconds of the table's validity; a later time is counted with the last value known. */
export function isPastLeapTable(t: GpsTime): boolean {
  return t.seconds >= LEAP_SECONDS.expiresGps;
}

const GPS_EPOCH_UNIX = 315_964_800;

/** UTC of a GPS time as ISO text "2024-05-18T16:53:02.25Z"; a leap second shows as :60. */
export function utcText(t: GpsTime): string {
  const steps = LEAP_SECONDS.steps;
  let offset = 0;
  let inLeap = false;
  for (const [at, value] of steps) {
    if (t.seconds >= at) offset = value;
    else if (t.seconds === at - 1) inLeap = true;
  }
  const unix = t.seconds + GPS_EPOCH_UNIX - offset - (inLeap ? 1 : 0);
  const base = new Date(unix * 1000).toISOString().slice(0, 19);
  const text = inLeap ? `${base.slice(0, 17)}60` : base;
  const frac = String(t.nanos).padStart(9, '0').replace(/0+$/, '');
  return frac === '' ? `${text}Z` : `${text}.${frac}Z`;
}

/** GPS time of a Unix time (POSIX seconds, which have no leap seconds). */
export function gpsOfUnix(unixSeconds: number): GpsTime {
  const whole = Math.floor(unixSeconds);
  let offset = 0;
  for (const [at, value] of LEAP_SECONDS.steps) {
    if (whole - GPS_EPOCH_UNIX + value >= at) offset = value;
  }
  return gpsTime(whole - GPS_EPOCH_UNIX + offset, (unixSeconds - whole) * NANO);
}
