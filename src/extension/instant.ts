import {
  formatGps,
  gpsOfUnix,
  gpsTime,
  isPastLeapTable,
  parseGps,
  utcText,
  type GpsTime,
} from '../core/data/gps-time';
import { LEAP_SECONDS } from '../core/data/leap-seconds';

/** An instant read from text, in both scales. */
export interface Instant {
  /** Scale the text was in. */
  readonly from: 'gps' | 'utc';
  readonly gps: string;
  readonly utc: string;
  /** Set when leap seconds after the table's end could shift the UTC. */
  readonly caution?: string;
}

const UTC = /^\s*(\d{4})-(\d\d)-(\d\d)(?:[T ](\d\d):(\d\d)(?::(\d\d)(?:\.(\d{1,9}))?)?)?\s*(?:Z|UTC)?\s*$/i;

/**
 * Reads "1400000000.25" as GPS seconds or "2024-05-18T16:53:02.25Z" as UTC (always UTC, also without the Z).
 * Undefined when the text is neither or names no possible date.
 */
export function readInstant(text: string): Instant | undefined {
  const from = /^\s*-?\d+(\.\d*)?\s*$/.test(text) ? 'gps' : 'utc';
  const t = from === 'gps' ? parseGps(text) : fromUtc(text);
  if (!t) return undefined;
  const caution = isPastLeapTable(t)
    ? `after the end of the leap-second table (${LEAP_SECONDS.version}): a leap second announced later would shift this`
    : undefined;
  return { from, gps: formatGps(t), utc: utcText(t), ...(caution === undefined ? {} : { caution }) };
}

function fromUtc(text: string): GpsTime | undefined {
  const m = UTC.exec(text);
  if (!m) return undefined;
  const [, year, month, day, hour = '0', minute = '0', second = '0', fraction = ''] = m;
  // A leap second is second 60: one second after second 59.
  const leap = second === '60';
  const ms = Date.UTC(
    Number(year),
    Number(month) - 1,
    Number(day),
    Number(hour),
    Number(minute),
    leap ? 59 : Number(second),
  );
  const date = new Date(ms);
  const sane =
    date.getUTCMonth() === Number(month) - 1 &&
    date.getUTCDate() === Number(day) &&
    Number(hour) < 24 &&
    Number(minute) < 60 &&
    Number(second) <= 60;
  if (!sane) return undefined;
  const whole = gpsOfUnix(ms / 1000);
  const t = gpsTime(whole.seconds + (leap ? 1 : 0), Number(fraction.padEnd(9, '0')));
  // Second 60 exists only where the table has a leap second.
  return leap && !/:60(\.|Z)/.test(utcText(t)) ? undefined : t;
}
