/**
 * GPS − UTC in seconds from each instant on (GPS seconds of the first moment with that value).
 * Source: IERS leap-seconds.list as shipped in Debian tzdata 2026f (public domain); read on 2026-12-01.
 * After `expiresGps` (28 June 2027) a leap second may exist that this table does not know.
 */
export const LEAP_SECONDS = {
  version: 'IERS list, tzdata 2026f',
  expiresGps: 1498176018,
  steps: [
    [46828801, 1],
    [78364802, 2],
    [109900803, 3],
    [173059204, 4],
    [252028805, 5],
    [315187206, 6],
    [346723207, 7],
    [393984008, 8],
    [425520009, 9],
    [457056010, 10],
    [504489611, 11],
    [551750412, 12],
    [599184013, 13],
    [820108814, 14],
    [914803215, 15],
    [1025136016, 16],
    [1119744017, 17],
    [1167264018, 18],
  ],
} as const;
