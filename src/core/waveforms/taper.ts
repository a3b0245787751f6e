/** Rises from 0 at `low` to 1 at `high` as half a cosine. */
function rise(f: number, low: number, high: number): number {
  if (f <= low) return 0;
  return f >= high ? 1 : 0.5 - 0.5 * Math.cos((Math.PI * (f - low)) / (high - low));
}

/**
 * Weight of a frequency in a band: 1 inside, 0 outside, edges included; with `width` > 0 half a cosine over that fraction of
 * each edge's frequency, inside the band.
 */
export function bandWeight(f: number, low: number, high: number, width: number): number {
  if (f < low || f > high) return 0;
  if (width === 0) return 1;
  return rise(f, low, low * (1 + width)) * (1 - rise(f, high * (1 - width), high));
}
