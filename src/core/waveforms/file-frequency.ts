import type { Warning } from '../data/quantity';
import { UserError } from '../data/errors';
import { numberText } from '../figures/number-text';
import { checkRising } from './columns-text';
import { fileLabel, type ScaledFile } from './file-waveform';
import { fromAmplitudeAndPhase, type SignalModel } from './signal-model';
import { cubicSpline } from './spline';
import { bandWeight } from './taper';

/** Turn of the phase from row to row, in radians, from which on it is not safe to say which way it went. */
const COARSE = Math.PI / 2;

/**
 * A transform from a file, its amplitude and unwrapped phase interpolated by cubic splines; zero outside of its rows. t = 0 is
 * where the file has it.
 */
export function fileAgainstFrequency(file: ScaledFile): SignalModel {
  const { x, name } = file;
  checkRising(x, name, 'frequency');
  if (x[0] < 0) throw new UserError('file-frequency', `${name}: the frequency ${x[0]} Hz is negative`, name);
  const low = Math.max(file.low ?? 0, x[0]);
  const high = Math.min(file.high ?? Infinity, x.at(-1)!);
  if (high <= low)
    throw new UserError(
      'band-empty',
      `${name} spans ${numberText(x[0])} to ${numberText(x.at(-1)!)} Hz, which leaves nothing between "low" and "high"`,
    );
  const plus = polar(x, file.plus);
  const cross = file.cross && polar(x, file.cross);
  const largest = Math.max(...[plus, cross].map((p) => p?.largestTurn ?? 0));
  const [first, last] = plus.times;
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
    before: Math.max(0, -first) + 4 / high,
    after: Math.max(0, last) + 4 / high,
    origin: 't = 0 of the file',
    numbers: [
      { id: 'file-rows', label: 'Rows of the file', value: x.length, unit: '' },
      { id: 'file-from', label: 'File from', value: x[0], unit: 'Hz' },
      { id: 'file-to', label: 'File to', value: x.at(-1)!, unit: 'Hz' },
    ],
    warnings: [...file.warnings, ...coarse(largest)],
    at: (frequency, which = 'plus') => {
      const p = which === 'plus' ? plus : cross;
      return fromAmplitudeAndPhase(
        frequency,
        (f) => {
          const w = p ? bandWeight(f, low, high, file.taper) : 0;
          return w === 0 ? 0 : w * p!.amplitude(f);
        },
        (f) => p!.phase(f),
      );
    },
  };
}

interface Polar {
  amplitude(f: number): number;
  phase(f: number): number;
  /** Largest turn of the phase between two rows with power in them, radians. */
  readonly largestTurn: number;
  /** Earliest and latest stationary-phase time −dφ/df / 2π where there is power. */
  readonly times: readonly [number, number];
}

function polar(x: Float64Array, [re, im]: readonly Float64Array[]): Polar {
  const amplitude = re.map((v, i) => Math.hypot(v, im[i]));
  const floor = 1e-3 * amplitude.reduce((a, b) => Math.max(a, b), 0);
  const phase = new Float64Array(x.length);
  let largestTurn = 0;
  let [first, last] = [Infinity, -Infinity];
  phase[0] = Math.atan2(im[0], re[0]);
  for (let i = 1; i < x.length; i++) {
    // Smallest turn that leads from the row before to this one.
    const turn = Math.atan2(im[i] * re[i - 1] - re[i] * im[i - 1], re[i] * re[i - 1] + im[i] * im[i - 1]);
    phase[i] = phase[i - 1] + turn;
    if (amplitude[i] < floor || amplitude[i - 1] < floor) continue;
    largestTurn = Math.max(largestTurn, Math.abs(turn));
    const time = -turn / (2 * Math.PI * (x[i] - x[i - 1]));
    first = Math.min(first, time);
    last = Math.max(last, time);
  }
  return {
    amplitude: cubicSpline(x, amplitude),
    phase: cubicSpline(x, phase),
    largestTurn,
    times: first <= last ? [first, last] : [0, 0],
  };
}

const coarse = (turn: number): Warning[] =>
  turn > COARSE
    ? [
        {
          code: 'coarse-phase',
          severity: 'problem',
          found: `the phase turns by up to ${numberText(turn, 3)} rad from row to row`,
          value: turn,
          consequence: 'It cannot be told which way it turned: between rows the wave may be wrong.',
          remedy: 'Write the file with more frequencies, or with t = 0 near the middle of the signal.',
        },
      ]
    : [];
