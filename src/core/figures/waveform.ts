import type { Waveform } from '../data/kinds';
import { columnsOf, extentOf, frequencyAxis } from './axis';
import type { Axis, Figure, Viewport } from './figure';
import { numberText } from './number-text';
import { thinLine } from './thin';

const POINTS = 3000;

/** Frequencies even in the logarithm over the band of a waveform, as far as it reaches above zero. */
export function bandGrid(
  waveform: Pick<Waveform, 'low' | 'high'>,
  top: number,
  points = POINTS,
): Float64Array {
  const high = Math.min(waveform.high, top);
  const low = Math.max(waveform.low, high / 1e4);
  return Float64Array.from({ length: points }, (_, i) => low * (high / low) ** (i / (points - 1)));
}

/** Characteristic strain 2 f |h̃| at frequencies in Hz. */
export function characteristicStrain(waveform: Waveform, frequency: Float64Array): Float64Array {
  const { re, im } = waveform.at(frequency);
  return frequency.map((f, k) => 2 * f * Math.hypot(re[k], im[k]));
}

/** Characteristic strain against frequency. */
export function waveformFigure(waveform: Waveform, viewport: Viewport): Figure {
  const f = bandGrid(waveform, waveform.df * (waveform.re.length - 1));
  const strain = characteristicStrain(waveform, f).map((v) => (v > 0 ? v : NaN));
  const x = frequencyAxis([f[0], f.at(-1)!], viewport);
  return {
    id: 'spectrum',
    title: 'Characteristic strain',
    caption: `${waveform.label}: characteristic strain 2f|h̃₊| against frequency, ${numberText(f[0])} to ${numberText(f.at(-1)!)} Hz, ${waveform.reference}.`,
    x,
    y: {
      label: 'Characteristic strain',
      unit: '',
      scale: 'log',
      extent: topDecades(extentOf([strain], 'log')),
    },
    traces: [
      { type: 'line', name: waveform.label, role: 'data', ...thinLine(f, strain, columnsOf(x, viewport)) },
    ],
    marks: [],
  };
}

/** What lies more than eight decades below the top is not worth an axis. */
const topDecades = ([low, high]: [number, number]): [number, number] => [Math.max(low, high * 1e-8), high];

/** Strain against time around t = 0. */
export function strainFigure(
  waveform: Waveform,
  picture: { readonly rate: number; readonly first: number; readonly samples: Float64Array },
  viewport: Viewport,
): Figure {
  const { rate, first, samples } = picture;
  const t = Float64Array.from(samples, (_, i) => first + i / rate);
  const extent: readonly [number, number] = [first, first + (samples.length - 1) / rate];
  const x: Axis = { label: `Time after the ${waveform.origin}`, unit: 's', scale: 'linear', extent };
  return {
    id: 'strain',
    title: 'Strain against time',
    caption: `${waveform.label}: h₊ against time from its ${waveform.origin}, ${waveform.reference}. Smallest and largest value of each pixel column.`,
    x,
    y: { label: 'Strain', unit: '', scale: 'linear', extent: extentOf([samples], 'linear') },
    traces: [{ type: 'line', name: 'h₊', role: 'data', ...thinLine(t, samples, columnsOf(x, viewport)) }],
    marks: [],
  };
}
