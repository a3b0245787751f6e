import type { GpsTime } from '../data/gps-time';
import { LEAP_SECONDS } from '../data/leap-seconds';

const GPS_EPOCH_UNIX = 315_964_800;
/** 2000-01-01T12:00:00Z, Julian date 2451545.0, as seconds since 1970. */
const J2000_UNIX = 946_728_000;
const DAY = 86_400;

/** GPS − UTC in seconds at a GPS time, from the project's dated table. */
function leapSeconds(t: GpsTime): number {
  let offset = 0;
  for (const [at, value] of LEAP_SECONDS.steps) if (t.seconds >= at) offset = value;
  return offset;
}

/**
 * Greenwich mean sidereal time in degrees, in [0, 360), for UT in days since Julian date 2451545.0:
 * 280.46061837° + 360.98564736629° d. Linear part of the IAU 1982 expression (MEMORY); the terms left out are below
 * 0.0001° until 2050.
 */
export function gmstDegrees(daysSinceJ2000: number): number {
  const whole = Math.floor(daysSinceJ2000);
  const turn = 280.46061837 + 0.98564736629 * daysSinceJ2000 + 360 * (daysSinceJ2000 - whole);
  return turn - 360 * Math.floor(turn / 360);
}

/**
 * Greenwich mean sidereal time in radians at a GPS time, with UTC taken for UT1: they differ by less than 0.9 s, which is
 * 0.004° of sky and less than 1e-4 in an antenna factor.
 */
export function siderealAngle(t: GpsTime): number {
  const unix = t.seconds + GPS_EPOCH_UNIX - leapSeconds(t);
  const days = (unix - J2000_UNIX + t.nanos * 1e-9) / DAY;
  return (gmstDegrees(days) * Math.PI) / 180;
}
