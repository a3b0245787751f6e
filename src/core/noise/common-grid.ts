import { UserError } from '../data/errors';
import type { Spectrum } from '../data/kinds';
import { lowerBound } from '../figures/thin';
import { numberText } from '../figures/number-text';

/** Two densities at the same frequencies. */
export interface CommonGrid {
  /** Hz, rising, without zero. */
  readonly frequency: Float64Array;
  readonly first: Float64Array;
  readonly second: Float64Array;
  /** Which of the two was interpolated. */
  readonly interpolated: 'first' | 'second' | undefined;
}

/**
 * Brings two spectra to common frequencies. Equal frequencies are taken as they are; else the spectrum with the finer
 * spacing (or the model or curve, when the other is an estimate) is interpolated at the frequencies of the other, straight
 * in log density against log frequency. Where there is no positive density there is NaN.
 *
 * @throws UserError when they have no frequency in common
 */
export function commonGrid(first: Spectrum, second: Spectrum): CommonGrid {
  const [a, b] = [first.frequency, second.frequency];
  const count = Math.min(a.length, b.length);
  let same = count > 0;
  for (let k = 0; k < count && same; k++) same = Math.abs(a[k] - b[k]) <= 1e-9 * Math.abs(a[k]);
  if (same) {
    const from = lowerBound(a, Number.MIN_VALUE);
    return {
      frequency: a.slice(from, count),
      first: positive(first.density.slice(from, count)),
      second: positive(second.density.slice(from, count)),
      interpolated: undefined,
    };
  }
  const low = Math.max(a[0], b[0]);
  const high = Math.min(a.at(-1)!, b.at(-1)!);
  const keepFirst =
    (first.estimate === undefined) !== (second.estimate === undefined)
      ? first.estimate !== undefined
      : (first.df || 0) >= (second.df || 0);
  const grid = keepFirst ? first : second;
  const other = keepFirst ? second : first;
  const from = lowerBound(grid.frequency, Math.max(low, Number.MIN_VALUE));
  let to = lowerBound(grid.frequency, high);
  while (to < grid.frequency.length && grid.frequency[to] <= high) to++;
  if (to <= from)
    throw new UserError(
      'no-common-band',
      `${first.label} (${numberText(a[0])} to ${numberText(a.at(-1)!)} Hz) and ${second.label} (${numberText(b[0])} to ${numberText(b.at(-1)!)} Hz) have no frequency in common`,
    );
  const frequency = grid.frequency.slice(from, to);
  const kept = positive(grid.density.slice(from, to));
  const made = interpolateLogLog(other.frequency, other.density, frequency);
  return keepFirst
    ? { frequency, first: kept, second: made, interpolated: 'second' }
    : { frequency, first: made, second: kept, interpolated: 'first' };
}

const positive = (density: Float64Array): Float64Array => density.map((s) => (s > 0 ? s : NaN));

/** Values at `at` of a curve that runs straight between its points in log against log; NaN outside and beside values that are not positive. */
export function interpolateLogLog(x: Float64Array, y: Float64Array, at: Float64Array): Float64Array {
  return at.map((f) => {
    const k = lowerBound(x, f);
    if (x[k] === f) return y[k] > 0 ? y[k] : NaN;
    if (k === 0 || k === x.length || !(x[k - 1] > 0) || !(y[k - 1] > 0) || !(y[k] > 0)) return NaN;
    const t = Math.log(f / x[k - 1]) / Math.log(x[k] / x[k - 1]);
    return Math.exp((1 - t) * Math.log(y[k - 1]) + t * Math.log(y[k]));
  });
}
