import type { Quantity, Warning } from '../data/quantity';
import { UserError } from '../data/errors';
import { numberText } from '../figures/number-text';
import type { Kernels } from '../kernels/kernels';
import { checkRising } from './columns-text';
import { fileLabel, type ScaledFile } from './file-waveform';
import { sampledTransform } from './sampled-transform';
import type { SignalModel } from './signal-model';
import { cubicSpline } from './spline';
import { bandWeight } from './taper';

/** Deviation from even spacing, in parts of the spacing, that is rounding of the written times. */
const EVEN = 1e-3;
/** Samples a file may have after it was put on an even grid. */
const MOST = 2 ** 21;
/** Fraction of the peak at an end from which on it is a jump. */
const JUMP = 0.01;

/** Strain against time from a file, its peak at t = 0. Uneven times are put on an even grid of the smallest spacing by a cubic spline. */
export function fileAgainstTime(file: ScaledFile, kernels: Kernels): SignalModel {
  checkRising(file.x, file.name, 'time');
  const grid = evenGrid(file);
  const { rate } = grid;
  const n = grid.plus.length;
  const size = grid.plus.map((v, i) => Math.hypot(v, grid.cross?.[i] ?? 0));
  let peak = 0;
  for (let i = 1; i < n; i++) if (size[i] > size[peak]) peak = i;
  if (!(size[peak] > 0)) throw new UserError('file-empty', `${file.name} holds zeros only`, file.name);
  const ends = Math.max(size[0], size[n - 1]) / size[peak];
  fade(grid.plus, file.taper);
  if (grid.cross) fade(grid.cross, file.taper);
  const low = file.low ?? 0;
  const high = Math.min(file.high ?? Infinity, rate / 2);
  if (high <= low)
    throw new UserError(
      'band-empty',
      `${file.name} reaches up to ${numberText(rate / 2)} Hz; the band from ${numberText(low)} to ${numberText(high)} Hz is empty`,
    );
  const plus = sampledTransform(kernels, grid.plus, peak, rate);
  const cross = grid.cross && sampledTransform(kernels, grid.cross, peak, rate);
  return {
    id: 'file',
    label: fileLabel(file),
    facts: file.facts,
    ...(file.distance === undefined ? {} : { distance: file.distance }),
    reference: 'as in the file',
    polarisation: cross ? 'both' : 'linear',
    quadrupole: false,
    low,
    high,
    top: high,
    before: Math.max(peak / rate, 1 / rate),
    after: (n - peak) / rate,
    origin: 'largest strain of the file',
    numbers: numbers(grid, size[peak], n),
    warnings: [...file.warnings, ...uneven(grid), ...abrupt(ends, file)],
    at: (frequency, which = 'plus') => {
      const transform = which === 'plus' ? plus : cross;
      if (!transform)
        return { re: new Float64Array(frequency.length), im: new Float64Array(frequency.length) };
      const out = transform(frequency);
      frequency.forEach((f, k) => {
        const w = bandWeight(f, low, high, 0);
        out.re[k] *= w;
        out.im[k] *= w;
      });
      return out;
    },
  };
}

interface EvenSamples {
  readonly rate: number;
  readonly plus: Float64Array;
  readonly cross: Float64Array | undefined;
  /** Largest and smallest spacing before; absent when the times were even. */
  readonly uneven?: readonly [smallest: number, largest: number];
}

function evenGrid(file: ScaledFile): EvenSamples {
  const { x, name } = file;
  const [plus] = file.plus;
  const cross = file.cross?.[0];
  const n = x.length;
  const step = (x[n - 1] - x[0]) / (n - 1);
  if (x.every((t, i) => Math.abs(t - x[0] - i * step) <= EVEN * step))
    return { rate: 1 / step, plus: plus.slice(), cross: cross?.slice() };
  let smallest = Infinity;
  let largest = 0;
  for (let i = 1; i < n; i++) {
    smallest = Math.min(smallest, x[i] - x[i - 1]);
    largest = Math.max(largest, x[i] - x[i - 1]);
  }
  const count = Math.floor((x[n - 1] - x[0]) / smallest) + 1;
  if (count > MOST)
    throw new UserError(
      'file-uneven',
      `the times of ${name} are uneven; on an even grid of their smallest spacing ${numberText(smallest)} s they would be ${count} samples, more than ${MOST}: resample the file`,
      name,
    );
  const on = (y: Float64Array): Float64Array => {
    const spline = cubicSpline(x, y);
    return Float64Array.from({ length: count }, (_, i) => spline(x[0] + i * smallest));
  };
  return {
    rate: 1 / smallest,
    plus: on(plus),
    cross: cross && on(cross),
    uneven: [smallest, largest],
  };
}

/** Half a cosine over `part` of the samples at both ends. */
function fade(y: Float64Array, part: number): void {
  const n = Math.floor(part * y.length);
  for (let i = 0; i < n; i++) {
    const w = 0.5 - 0.5 * Math.cos((Math.PI * (i + 0.5)) / n);
    y[i] *= w;
    y[y.length - 1 - i] *= w;
  }
}

function numbers(grid: EvenSamples, peak: number, n: number): Quantity[] {
  const squares = grid.plus.reduce((s, v) => s + v * v, 0);
  return [
    {
      id: 'peak-strain',
      label: 'Largest strain',
      value: peak,
      unit: '',
      convention: grid.cross ? '√(h₊² + h×²)' : '|h₊|',
    },
    {
      id: 'root-sum-square',
      label: 'Root-sum-square of h₊',
      value: Math.sqrt(squares / grid.rate),
      unit: '1/√Hz',
      convention: '√∫h₊² dt, whole file',
      explain: { formula: '√(Σ h₊² Δt)', source: 'definition' },
    },
    {
      id: 'file-rate',
      label: 'Sample rate of the file',
      value: grid.rate,
      unit: 'Hz',
      ...(grid.uneven ? { convention: 'of the even grid it was put on' } : {}),
    },
    { id: 'file-length', label: 'Length of the file', value: n / grid.rate, unit: 's' },
  ];
}

const uneven = ({ uneven: spacing }: EvenSamples): Warning[] =>
  spacing
    ? [
        {
          code: 'uneven-times',
          severity: 'note',
          found: `the times are spaced by ${numberText(spacing[0])} to ${numberText(spacing[1])} s`,
          value: spacing[1] / spacing[0],
          consequence: 'They were put on an even grid of the smallest spacing by a cubic spline.',
          remedy: 'Where the file is coarse for its frequency, sample it more finely.',
        },
      ]
    : [];

const abrupt = (ends: number, file: ScaledFile): Warning[] =>
  ends > JUMP && file.taper === 0
    ? [
        {
          code: 'abrupt-ends',
          severity: 'caution',
          found: `the file begins or ends at ${numberText(100 * ends, 3)} % of its largest strain`,
          value: ends,
          consequence:
            'The jump spreads over all frequencies, most at low ones where it may outweigh the signal.',
          remedy: 'Set "taper" to fade both ends, and "low" to where the signal begins.',
          fix: { kind: 'set', label: 'Fade 5 % at both ends', params: { taper: 0.05 } },
        },
      ]
    : [];
