import { formatGps } from '../data/gps-time';
import type { ConsistentPeak } from '../data/kinds';
import type { Figure } from './figure';
import { numberText } from './number-text';
import { extentOf } from './axis';

/** What each frequency band adds to χ² of a peak, with the mean noise gives. */
export function bandFigure(peak: ConsistentPeak, notes: string): Figure {
  const { edges, parts, chiSquared, freedom } = peak;
  const count = parts.length;
  const mean = freedom / count;
  const ends = [edges[0], edges[count]] as const;
  return {
    id: 'bands',
    title: 'χ² by frequency band',
    caption:
      `What each of ${count} bands of equal expected loudness adds to χ² of the peak at GPS ${formatGps(peak.time)}: together ${numberText(chiSquared)} ` +
      `with ${freedom} degrees of freedom. Gaussian noise with a signal of the template's shape adds ${numberText(mean, 3)} per band on average.${notes}`,
    x: { label: 'Frequency', unit: 'Hz', scale: 'log', extent: ends },
    y: { label: 'Part of χ²', unit: '', scale: 'linear', extent: [0, 1.05 * Math.max(mean, ...parts)] },
    traces: [
      { type: 'bars', name: 'part of χ²', role: 'data', edges, counts: parts },
      {
        type: 'line',
        name: 'mean in Gaussian noise',
        role: 'reference',
        x: Float64Array.of(...ends),
        y: Float64Array.of(mean, mean),
      },
    ],
    marks: [],
  };
}

/** |SNR| around a peak over what the template alone would give there. */
export function shapeFigure(peak: ConsistentPeak, notes: string): Figure {
  const { lag, around, expected } = peak;
  return {
    id: 'shape',
    title: 'Shape of the peak',
    caption:
      `|SNR| from ${numberText(lag[0])} to ${numberText(lag.at(-1)!)} s about the peak of ${numberText(peak.snr)} at GPS ${formatGps(peak.time)}, with the template's autocorrelation times that peak. ` +
      `The mean square of their difference (as complex numbers) is ${numberText(peak.shape, 3)} times what Gaussian noise gives.${notes}`,
    x: {
      label: `Time after GPS ${formatGps(peak.time)}`,
      unit: 's',
      scale: 'linear',
      extent: [lag[0], lag.at(-1)!],
    },
    y: {
      label: '|SNR|',
      unit: '',
      scale: 'linear',
      extent: [0, 1.05 * extentOf([around, expected], 'linear')[1]],
    },
    traces: [
      { type: 'line', name: '|SNR|', role: 'data', x: lag, y: around },
      { type: 'line', name: 'expected shape', role: 'model', x: lag, y: expected },
    ],
    marks: [],
  };
}
