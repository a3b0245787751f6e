import { describe, expect, test } from 'vitest';
import { gpsTime } from '../../src/core/data/gps-time';
import {
  antennaFactors,
  arrivalDelay,
  directionTo,
  lightTravelTime,
  responseTensor,
  SPEED_OF_LIGHT,
} from '../../src/core/sites/antenna';
import { gmstDegrees, siderealAngle } from '../../src/core/sites/sidereal';
import type { Site } from '../../src/core/sites/sites';
import { armVector, dot, localFrame, sitePosition } from '../../src/core/sites/wgs84';

const DEG = Math.PI / 180;
const make = (latitude: number, longitude: number, x: number, y: number, height = 0, tilt = 0): Site => ({
  name: 'elm',
  title: 'Elm',
  latitude,
  longitude,
  height,
  arms: { x: { azimuth: x, tilt }, y: { azimuth: y, tilt: 0 } },
});
const sites = [make(61.4, 98.7, 37, 127, 112), make(-33, -71.2, 250, 160), make(5, 170, 10, 70, 3000, 0.03)];
const now = gpsTime(1_400_000_168, 400_000_000);

describe('position', () => {
  // Astropy 8.0.1, EarthLocation.from_geodetic (COMPUTED)
  test.each([
    [61.4, 98.7, 112, [-463028.1633557537, 3025902.5975751933, 5576914.089888601]],
    [42.6, 69.2, 305, [1669844.006633785, 4395895.373020403, 4295104.593695124]],
    [-90, 12, 0, [0, 0, -6356752.314245179]],
    [0, -180, 8000, [-6386137, 0, 0]],
  ])('of %d°, %d°, %d m', (latitude, longitude, height, want) => {
    sitePosition({ latitude, longitude, height }).forEach((v, i) =>
      expect(Math.abs(v - want[i])).toBeLessThan(1e-6),
    );
  });
});

test('east, north, up are a right-handed unit frame; azimuth 0 is north, 90 east, tilt 90 up', () => {
  const place = { latitude: -33, longitude: 71, height: 0 };
  const { east, north, up } = localFrame(place);
  expect([dot(east, north), dot(north, up), dot(up, east)].every((v) => Math.abs(v) < 1e-15)).toBe(true);
  expect([dot(east, east), dot(north, north), dot(up, up)].every((v) => Math.abs(v - 1) < 1e-15)).toBe(true);
  const cross = [
    east[1] * north[2] - east[2] * north[1],
    east[2] * north[0] - east[0] * north[2],
    east[0] * north[1] - east[1] * north[0],
  ];
  cross.forEach((v, i) => expect(v).toBeCloseTo(up[i], 14));
  expect(dot(armVector(place, 0), north)).toBeCloseTo(1, 14);
  expect(dot(armVector(place, 90), east)).toBeCloseTo(1, 14);
  expect(dot(armVector(place, 123, 90), up)).toBeCloseTo(1, 14);
});

describe('sidereal time', () => {
  test('is 280.46061837° at Julian date 2451545.0, and gains 0.98564736629° a day', () => {
    expect(gmstDegrees(0)).toBe(280.46061837);
    expect(gmstDegrees(1)).toBeCloseTo(280.46061837 + 0.98564736629, 9);
    expect(gmstDegrees(-0.25)).toBeCloseTo(280.46061837 - 360.98564736629 / 4, 9);
  });

  // Astropy 8.0.1, Greenwich mean sidereal time, IAU 1982, UT1 taken as UTC (COMPUTED)
  test.each([
    [1_400_000_000, 0, 129.13805148095437],
    [1_000_000_000, 0, 19.301649973748344],
    [1_262_304_018, 500_000_000, 105.05214681851695],
    [630_763_213, 0, 280.460618375],
  ])('at GPS %d + %d ns', (seconds, nanos, degrees) => {
    expect(Math.abs(siderealAngle(gpsTime(seconds, nanos)) / DEG - degrees)).toBeLessThan(1e-4);
  });

  test('direction to a source of date: Astropy 8.0.1, true equator to Earth-fixed frame (COMPUTED; nutation 0.005°)', () => {
    const n = directionTo({ rightAscension: 14.5 * DEG, declination: -27 * DEG, polarisation: 0 }, now);
    [-0.3813462, -0.805274, -0.45399214].forEach((v, i) => expect(Math.abs(n[i] - v)).toBeLessThan(1e-4));
  });
});

describe('antenna factors', () => {
  test.each(sites)(
    'average over the sky: ⟨F₊²⟩ = ⟨F×²⟩ = ⅖ D:D, which is 1/5 for arms at a right angle',
    (site) => {
      const d = responseTensor(site);
      const dd = d.reduce((s, v) => s + v * v, 0);
      let plus = 0;
      let cross = 0;
      let weight = 0;
      const n = 48;
      for (let i = 0; i < n; i++) {
        // midpoints in sin δ are exact to order 1/n² for these polynomials of degree 4; weights by Simpson would do as well
        const declination = Math.asin(-1 + (2 * (i + 0.5)) / n);
        for (let j = 0; j < 16; j++)
          for (let k = 0; k < 8; k++) {
            const f = antennaFactors(
              site,
              { rightAscension: (j * Math.PI) / 8, declination, polarisation: (k * Math.PI) / 8 },
              now,
            );
            plus += f.plus ** 2;
            cross += f.cross ** 2;
            weight += 1;
          }
      }
      expect(plus / weight).toBeCloseTo((2 / 5) * dd, 3);
      expect(cross / weight).toBeCloseTo((2 / 5) * dd, 3);
      const square =
        Math.abs(dot(armVector(site, site.arms.x.azimuth), armVector(site, site.arms.y.azimuth))) < 1e-9;
      if (square) expect(dd).toBeCloseTo(0.5, 12);
    },
  );

  const overhead = (site: Site, polarisation: number) => ({
    rightAscension: site.longitude * DEG + siderealAngle(now),
    declination: site.latitude * DEG,
    polarisation,
  });

  test('overhead F₊² + F×² = 1 for arms at a right angle, whatever ψ', () => {
    for (const psi of [0, 0.3, 1, 2.5]) {
      const f = antennaFactors(sites[0], overhead(sites[0], psi), now);
      expect(f.plus ** 2 + f.cross ** 2).toBeCloseTo(1, 12);
    }
  });

  test('overhead, arms east and north, ψ = 0: F₊ = 1, F× = 0; ψ = 45° exchanges them; ψ = 90° changes the sign', () => {
    const site = make(30, 40, 90, 0);
    const at = (psi: number) => antennaFactors(site, overhead(site, psi * DEG), now);
    expect(at(0).plus).toBeCloseTo(1, 12);
    expect(at(0).cross).toBeCloseTo(0, 12);
    expect(at(45).plus).toBeCloseTo(0, 12);
    expect(at(45).cross).toBeCloseTo(-1, 12);
    expect(at(90).plus).toBeCloseTo(-1, 12);
  });

  test('a wave along one arm has F₊² + F×² = ¼, along the bisector 0', () => {
    const site = make(0, 0, 90, 0);
    // at longitude 0 on the equator the x arm points east: right ascension six hours on, declination 0
    const along = (ra: number, dec: number) =>
      antennaFactors(
        site,
        { rightAscension: siderealAngle(now) + ra, declination: dec, polarisation: 0.4 },
        now,
      );
    const f = along(Math.PI / 2, 0);
    expect(f.plus ** 2 + f.cross ** 2).toBeCloseTo(0.25, 12);
    const g = along(Math.PI / 2, Math.PI / 4);
    expect(g.plus ** 2 + g.cross ** 2).toBeCloseTo(0, 12);
  });
});

describe('delays', () => {
  test('no direction has a delay between sites above the light travel time; along the line it is reached', () => {
    const [a, b] = sites;
    const bound = lightTravelTime(a, b);
    const pa = sitePosition(a);
    const pb = sitePosition(b);
    let most = 0;
    for (let i = 0; i < 40; i++)
      for (let j = 0; j < 80; j++) {
        const source = {
          rightAscension: (j * Math.PI) / 40,
          declination: Math.asin(-1 + (i + 0.5) / 20),
          polarisation: 0,
        };
        most = Math.max(most, Math.abs(arrivalDelay(a, source, now) - arrivalDelay(b, source, now)));
      }
    expect(most).toBeLessThanOrEqual(bound * (1 + 1e-12));
    expect(most).toBeGreaterThan(0.99 * bound);
    const line = [0, 1, 2].map((i) => (pa[i] - pb[i]) / (bound * SPEED_OF_LIGHT));
    const source = {
      rightAscension: Math.atan2(line[1], line[0]) + siderealAngle(now),
      declination: Math.asin(line[2]),
      polarisation: 0,
    };
    expect(arrivalDelay(b, source, now) - arrivalDelay(a, source, now)).toBeCloseTo(bound, 12);
  });

  test('a source overhead is seen before the Earth’s centre sees it, by nearly the radius', () => {
    const site = make(0, 12, 0, 90);
    const source = { rightAscension: 12 * DEG + siderealAngle(now), declination: 0, polarisation: 0 };
    expect(arrivalDelay(site, source, now)).toBeCloseTo(-6378137 / SPEED_OF_LIGHT, 12);
  });
});
