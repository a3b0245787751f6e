import type { GpsTime } from '../data/gps-time';
import { siderealAngle } from './sidereal';
import type { Site } from './sites';
import { armVector, distance, dot, sitePosition, type Vector } from './wgs84';

export const SPEED_OF_LIGHT = 299_792_458;

/** A direction on the sky and a polarisation angle, all in radians. */
export interface SkySource {
  readonly rightAscension: number;
  readonly declination: number;
  /**
   * ψ, from the node line to the wave's X axis, counter-clockwise about the direction the wave travels in. At ψ = 0, X points
   * west and Y north as seen at the source's place on the sky.
   */
  readonly polarisation: number;
}

/** Symmetric 3 × 3 tensor, row by row. */
export type Tensor = readonly [number, number, number, number, number, number, number, number, number];

const outer = (a: Vector, b: Vector): number[] => a.flatMap((p) => b.map((q) => p * q));
const contract = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, p, i) => sum + p * b[i], 0);

/**
 * D = ½(x⊗x − y⊗y) for the unit vectors of the arms, in the frame that turns with the Earth. The strain of a wave much longer
 * than the arms is D : h.
 */
export function responseTensor(site: Site): Tensor {
  const x = armVector(site, site.arms.x.azimuth, site.arms.x.tilt);
  const y = armVector(site, site.arms.y.azimuth, site.arms.y.tilt);
  const yy = outer(y, y);
  return outer(x, x).map((v, i) => (v - yy[i]) / 2) as unknown as Tensor;
}

/** Unit vector from the Earth's centre to the source, in the frame that turns with the Earth. */
export function directionTo(source: SkySource, at: GpsTime): Vector {
  const longitude = source.rightAscension - siderealAngle(at);
  const level = Math.cos(source.declination);
  return [level * Math.cos(longitude), level * Math.sin(longitude), Math.sin(source.declination)];
}

/**
 * Antenna factors F₊ = D : (X⊗X − Y⊗Y) and F× = D : (X⊗Y + Y⊗X); the site's strain is F₊h₊ + F×h×. Both lie in [−1, 1].
 * Jaranowski, Królak, Schutz, PRD 58, 063001 (1998) and, for the axes, Anderson, Brady, Creighton, Flanagan, PRD 63, 042003
 * (2001), appendix B (both MEMORY). The right ascension is of date: for J2000 coordinates precession (0.014° a year) is left out,
 * as are nutation and aberration.
 */
export function antennaFactors(site: Site, source: SkySource, at: GpsTime): { plus: number; cross: number } {
  const phi = source.rightAscension - siderealAngle(at);
  const west: Vector = [Math.sin(phi), -Math.cos(phi), 0];
  const sinDec = Math.sin(source.declination);
  const north: Vector = [-sinDec * Math.cos(phi), -sinDec * Math.sin(phi), Math.cos(source.declination)];
  const c = Math.cos(source.polarisation);
  const s = Math.sin(source.polarisation);
  const x: Vector = [c * west[0] + s * north[0], c * west[1] + s * north[1], c * west[2] + s * north[2]];
  const y: Vector = [c * north[0] - s * west[0], c * north[1] - s * west[1], c * north[2] - s * west[2]];
  const d = responseTensor(site);
  return {
    plus: contract(d, outer(x, x)) - contract(d, outer(y, y)),
    cross: 2 * contract(d, outer(x, y)),
  };
}

/** Seconds by which a wavefront reaches the site after it reaches the Earth's centre: −r·n/c; negative when it comes first. */
export function arrivalDelay(site: Site, source: SkySource, at: GpsTime): number {
  return -dot(sitePosition(site), directionTo(source, at)) / SPEED_OF_LIGHT;
}

/** Seconds light takes along the straight line between two sites: the bound on the difference of their arrival times. */
export function lightTravelTime(a: Site, b: Site): number {
  return distance(sitePosition(a), sitePosition(b)) / SPEED_OF_LIGHT;
}
