/** A vector in the frame that turns with the Earth: x to latitude 0, longitude 0; z to the north pole. */
export type Vector = readonly [x: number, y: number, z: number];

/** WGS 84 ellipsoid: semi-major axis in m and inverse flattening (defining values). */
const A = 6378137;
const INVERSE_FLATTENING = 298.257223563;
const DEGREE = Math.PI / 180;

/** Geodetic latitude and longitude in degrees, height above the ellipsoid in metres. */
export interface Geodetic {
  readonly latitude: number;
  readonly longitude: number;
  readonly height: number;
}

/** Position in metres from the Earth's centre. */
export function sitePosition({ latitude, longitude, height }: Geodetic): Vector {
  const f = 1 / INVERSE_FLATTENING;
  const e2 = f * (2 - f);
  const sinLat = Math.sin(latitude * DEGREE);
  const cosLat = Math.cos(latitude * DEGREE);
  const normal = A / Math.sqrt(1 - e2 * sinLat * sinLat);
  return [
    (normal + height) * cosLat * Math.cos(longitude * DEGREE),
    (normal + height) * cosLat * Math.sin(longitude * DEGREE),
    (normal * (1 - e2) + height) * sinLat,
  ];
}

/** Unit vectors to local east, north and up (the normal of the ellipsoid). */
export function localFrame({ latitude, longitude }: Geodetic): { east: Vector; north: Vector; up: Vector } {
  const sinLat = Math.sin(latitude * DEGREE);
  const cosLat = Math.cos(latitude * DEGREE);
  const sinLon = Math.sin(longitude * DEGREE);
  const cosLon = Math.cos(longitude * DEGREE);
  return {
    east: [-sinLon, cosLon, 0],
    north: [-sinLat * cosLon, -sinLat * sinLon, cosLat],
    up: [cosLat * cosLon, cosLat * sinLon, sinLat],
  };
}

/** Unit vector along an arm: azimuth in degrees clockwise from north, tilt in degrees above the horizontal. */
export function armVector(place: Geodetic, azimuth: number, tilt = 0): Vector {
  const { east, north, up } = localFrame(place);
  const level = Math.cos(tilt * DEGREE);
  const e = level * Math.sin(azimuth * DEGREE);
  const n = level * Math.cos(azimuth * DEGREE);
  const u = Math.sin(tilt * DEGREE);
  return [
    e * east[0] + n * north[0] + u * up[0],
    e * east[1] + n * north[1] + u * up[1],
    e * east[2] + n * north[2] + u * up[2],
  ];
}

export function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

/** Length of a − b. */
export function distance(a: Vector, b: Vector): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
}
