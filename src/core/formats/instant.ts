import { addSeconds, formatGps, gpsOfUnix, gpsTime, parseGps, type GpsTime } from '../data/gps-time';
import type { TimeScale } from './meaning';

export type Scalar = string | number | bigint | boolean;

/** A time found in a file and how it was read, or why it is none. */
export type InstantReading =
  | { readonly time: GpsTime; readonly how: string }
  | { readonly relative: true; readonly value: number }
  | { readonly rejected: string };

/**
 * GPS seconds from here on would lie after July 2027; Unix seconds reached the number in July 2017. A bare number
 * below is taken for GPS, above for Unix: the trade counts in GPS, so only a number that GPS cannot explain is Unix.
 */
const BARE_UNIX_FROM = 1_500_000_000;

/** Smaller numbers are seconds since something the file does not say (GPS 1e8 is March 1983, before digital records). */
const ABSOLUTE_FROM = 100_000_000;

/**
 * Reads a time: seconds as number, integer or decimal text (exact), seconds in ms/µs/ns by magnitude, or ISO text in UTC.
 * `scale` is what the words around it say; without it the magnitude decides, and `how` says so.
 */
export function readInstant(value: Scalar, scale?: TimeScale): InstantReading {
  if (typeof value === 'boolean') return { rejected: 'is a truth value' };
  if (typeof value === 'string') {
    const text = value.trim();
    if (/^[-+]?(\d+\.?\d*|\.\d+)$/.test(text)) return fromDecimal(text.replace(/^\+/, ''), scale);
    if (/^[-+]?(\d+\.?\d*|\.\d+)e[-+]?\d+$/i.test(text)) return fromDecimal(decimalOf(Number(text)), scale);
    return fromIso(text);
  }
  if (typeof value === 'number' && !Number.isFinite(value)) return { rejected: `is ${value}` };
  return fromDecimal(typeof value === 'bigint' ? value.toString() : decimalOf(value), scale);
}

/** Decimal text without exponent, down to nanoseconds. */
function decimalOf(x: number): string {
  return Math.abs(x) >= 1e21 ? BigInt(x).toString() : /e/.test(String(x)) ? x.toFixed(9) : String(x);
}

function fromDecimal(text: string, scale: TimeScale | undefined): InstantReading {
  const digits = /^-?(\d*)/.exec(text)![1].replace(/^0+/, '').length;
  const shift = digits <= 11 ? 0 : digits <= 14 ? 3 : digits <= 17 ? 6 : digits <= 20 ? 9 : -1;
  if (shift < 0) return { rejected: `is ${text}, too large for a time` };
  const seconds = shift === 0 ? text : pointLeft(text, shift);
  const value = Number(seconds);
  if (Math.abs(value) < ABSOLUTE_FROM) return { relative: true, value };
  const unit =
    shift === 0 ? 'seconds' : shift === 3 ? 'milliseconds' : shift === 6 ? 'microseconds' : 'nanoseconds';
  const stamp = parseGps(seconds);
  const unix = scale === 'unix' || scale === 'utc' || (scale === undefined && value >= BARE_UNIX_FROM);
  const why = scale === undefined ? ' by its magnitude' : '';
  if (!unix) return { time: stamp, how: `read as GPS ${unit}${why}` };
  const base = gpsOfUnix(stamp.seconds);
  return { time: gpsTime(base.seconds, stamp.nanos), how: `read as Unix ${unit}${why}` };
}

function pointLeft(text: string, places: number): string {
  const sign = text.startsWith('-') ? '-' : '';
  const [whole = '', fraction = ''] = text.replace('-', '').split('.');
  const padded = whole.padStart(places + 1, '0');
  return `${sign}${padded.slice(0, -places)}.${padded.slice(-places)}${fraction}`;
}

const ISO =
  /^(\d{4})-?(\d\d)-?(\d\d)(?:[T ]+(\d\d):?(\d\d)(?::?(\d\d)(?:[.,](\d+))?)?)?\s*(Z|UTC|GMT|([-+])(\d\d):?(\d\d)?)?$/i;

function fromIso(text: string): InstantReading {
  const m = ISO.exec(text);
  if (!m) return { rejected: `is "${text}", not a time` };
  const n = (i: number): number => Number(m.at(i) ?? 0);
  const leap = n(6) === 60;
  const midnight = Date.UTC(n(1), n(2) - 1, n(3)) / 1000;
  const zone = m.at(9) === undefined ? 0 : (m[9] === '-' ? -1 : 1) * (n(10) * 3600 + n(11) * 60);
  const unix = midnight + n(4) * 3600 + n(5) * 60 + (leap ? 59 : n(6)) - zone;
  const valid = n(2) >= 1 && n(2) <= 12 && n(3) >= 1 && n(3) <= 31 && n(4) < 24 && n(5) < 60 && n(6) <= 60;
  if (!valid) return { rejected: `is "${text}", not a time` };
  const nanos = Number((m.at(7) ?? '').slice(0, 9).padEnd(9, '0'));
  const base = gpsOfUnix(unix);
  const time = addSeconds(gpsTime(base.seconds, nanos), leap ? 1 : 0);
  const how = m.at(8) === undefined ? 'no zone written, read as UTC' : 'read as UTC text';
  return { time, how: `${how}, GPS ${formatGps(time)}` };
}
