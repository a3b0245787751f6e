import type { LoudTile, MapPlane } from '../data/kinds';
import type { QPlane } from './q-tiling';

/** Candidates kept while the list is long: the loudest ones decide. */
const MOST = 200_000;

/**
 * The loudest tiles, each with what overlaps it left out: of tiles whose middles lie within one tile's length in time and one
 * bandwidth in frequency of a louder one, the louder one stands for all.
 *
 * @param least energy below which a tile is not worth listing
 */
export function loudTiles(planes: readonly MapPlane[], count: number, least: number): LoudTile[] {
  let candidates: LoudTile[] = [];
  let floor = least;
  for (const { q = 0, rows } of planes)
    for (const { frequency, offset, cell, values } of rows) {
      for (let i = 0; i < values.length; i++)
        if (values[i] > floor)
          candidates.push({ time: offset + (i + 0.5) * cell, frequency, q, energy: values[i] });
      if (candidates.length > MOST) {
        candidates.sort((a, b) => b.energy - a.energy);
        candidates = candidates.slice(0, MOST / 4);
        floor = candidates.at(-1)!.energy;
      }
    }
  candidates.sort((a, b) => b.energy - a.energy);
  const kept: LoudTile[] = [];
  for (const tile of candidates) {
    if (kept.length >= count) break;
    if (!kept.some((k) => overlap(k, tile))) kept.push(tile);
  }
  return kept;
}

/** Standard deviations of a tile: Q/(4πφ) in time for its energy, φ/Q in frequency; two tiles touch within three of the wider. */
function overlap(a: LoudTile, b: LoudTile): boolean {
  const inTime = (t: LoudTile): number => t.q / (4 * Math.PI * t.frequency);
  const inFrequency = (t: LoudTile): number => t.frequency / t.q;
  return (
    Math.abs(a.time - b.time) < 3 * (inTime(a) + inTime(b)) &&
    Math.abs(a.frequency - b.frequency) < 3 * (inFrequency(a) + inFrequency(b))
  );
}

/** Tiles that the tiling asks for: at least as many as are independent, and so a safe number of trials. */
export const tileCount = (planes: readonly QPlane[], share: number): number =>
  Math.round(share * planes.reduce((sum, p) => sum + p.rows.reduce((s, r) => s + r.tiles, 0), 0));

/** Probability that Gaussian noise reaches an energy somewhere among so many tiles: 1 − (1 − e^(−E))^n. */
export const chanceOf = (energy: number, trials: number): number =>
  -Math.expm1(trials * Math.log1p(-Math.exp(-energy)));

/** Signal-to-noise ratio of a tile: noise alone has energy 1, a signal of ratio ρ adds ρ²/2. */
export const tileSnr = (energy: number): number => Math.sqrt(Math.max(0, 2 * (energy - 1)));

/** Mean energy of all tiles with a value, and how many cells these are. */
export function meanEnergy(planes: readonly MapPlane[]): { mean: number; cells: number; empty: number } {
  let [sum, cells, empty] = [0, 0, 0];
  for (const { rows } of planes)
    for (const { values } of rows)
      for (const v of values) {
        if (Number.isNaN(v)) empty++;
        else {
          sum += v;
          cells++;
        }
      }
  return { mean: sum / cells, cells, empty };
}
