import { describe, expect, it } from 'vitest';
import {
  addSamples,
  addSeconds,
  compareGps,
  formatGps,
  gpsOfUnix,
  gpsTime,
  isPastLeapTable,
  lossySeconds,
  parseGps,
  secondsBetween,
  utcText,
} from '../../src/core/data/gps-time';
import { LEAP_SECONDS } from '../../src/core/data/leap-seconds';

// Pairs of GPS and UTC from the IERS leap-second list and Astropy's documentation (READ).
const KNOWN: readonly (readonly [gps: string, utc: string])[] = [
  ['0', '1980-01-06T00:00:00Z'],
  ['46828800', '1981-06-30T23:59:60Z'],
  ['46828801', '1981-07-01T00:00:00Z'],
  ['630720013', '2000-01-01T00:00:00Z'],
  ['1126259462.391', '2015-09-14T09:50:45.391Z'],
  ['1167264016', '2016-12-31T23:59:59Z'],
  ['1167264017', '2016-12-31T23:59:60Z'],
  ['1167264017.5', '2016-12-31T23:59:60.5Z'],
  ['1167264018', '2017-01-01T00:00:00Z'],
  ['1419724818', '2025-01-01T00:00:00Z'],
];

describe('GPS and UTC', () => {
  it.each(KNOWN)('%s is %s', (gps, utc) => {
    expect(utcText(parseGps(gps))).toBe(utc);
    // Unix time has no leap second: 23:59:60 is counted as the first second of the next day.
    if (utc.includes(':60')) return;
    const fraction = /\.\d+/.exec(utc)?.[0] ?? '';
    expect(formatGps(gpsOfUnix(Date.parse(utc.replace(fraction, '')) / 1000)) + fraction).toBe(gps);
  });

  it('goes round through Unix time on both sides of every leap second', () => {
    for (const [at, offset] of LEAP_SECONDS.steps) {
      expect(utcText(gpsTime(at - 1))).toMatch(/:60Z$/);
      expect(utcText(gpsTime(at))).toMatch(/T00:00:00Z$/);
      const unix = at + 315_964_800 - offset;
      expect(gpsOfUnix(unix).seconds).toBe(at);
      expect(gpsOfUnix(unix - 1).seconds).toBe(at - 2);
    }
  });

  it('knows the end of its leap-second table', () => {
    expect(isPastLeapTable(gpsTime(LEAP_SECONDS.expiresGps - 1))).toBe(false);
    expect(isPastLeapTable(gpsTime(LEAP_SECONDS.expiresGps))).toBe(true);
  });
});

describe('exactness', () => {
  it('keeps nanoseconds that one float64 would lose', () => {
    const t = parseGps('1400000000.123456789');
    expect(t.nanos).toBe(123456789);
    expect(formatGps(t)).toBe('1400000000.123456789');
    expect(lossySeconds(t)).not.toBe(1400000000.123456);
  });

  it('finds every sample time to the nanosecond', () => {
    const start = parseGps('1400000000.000000001');
    const day = 86400 * 16384;
    expect(formatGps(addSamples(start, day, 16384))).toBe('1400086400.000000001');
    expect(formatGps(addSamples(start, day + 1, 16384))).toBe('1400086400.000061036');
    expect(formatGps(addSamples(start, 3, 3))).toBe('1400000001.000000001');
    expect(formatGps(addSamples(start, -1, 4))).toBe('1399999999.750000001');
  });

  it('carries nanoseconds', () => {
    expect(gpsTime(5, 1_500_000_000)).toEqual({ seconds: 6, nanos: 500_000_000 });
    expect(gpsTime(5, -1)).toEqual({ seconds: 4, nanos: 999_999_999 });
    expect(gpsTime(4.999_999_999_9)).toEqual({ seconds: 5, nanos: 0 });
    expect(addSeconds(gpsTime(10, 750_000_000), 0.5)).toEqual({ seconds: 11, nanos: 250_000_000 });
    expect(secondsBetween(gpsTime(10, 250_000_000), gpsTime(8, 750_000_000))).toBe(1.5);
    expect(compareGps(gpsTime(1, 2), gpsTime(1, 1))).toBeGreaterThan(0);
  });

  it.each(['-1.5', '-0.25', '0', '0.000000001', '1400000000.1', '-315964800'])(
    'writes %s as it was read',
    (text) => {
      expect(formatGps(parseGps(text))).toBe(text);
    },
  );

  it.each(['', 'x', '1e9', '1,5', '1400000000.5s'])('refuses "%s"', (text) => {
    expect(() => parseGps(text)).toThrow(RangeError);
  });

  it('refuses what is not finite', () => {
    expect(() => gpsTime(NaN)).toThrow(RangeError);
    expect(() => parseGps(Infinity)).toThrow(RangeError);
  });
});
