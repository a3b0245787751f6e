import type { Spectrum } from '../data/kinds';
import { amplitudeUnit } from '../noise/units';
import { columnsOf, extentOf, frequencyAxis } from './axis';
import type { Figure, Mark, Trace, TraceRole, Viewport } from './figure';
import { numberText } from './number-text';
import { lowerBound, thinLine, thinRange } from './thin';

/** A spectrum as one line of a figure. */
export interface SpectrumCurve {
  readonly spectrum: Spectrum;
  readonly role: TraceRole;
  readonly name?: string;
  /** Draw the 90 % interval of one bin as a filled band, when the spectrum is an estimate. */
  readonly band?: boolean;
}

export interface SpectrumFigureOptions {
  readonly id?: string;
  readonly title?: string;
  readonly marks?: readonly Mark[];
  /** A sentence put after the caption. */
  readonly note?: string;
}

/**
 * One-sided amplitude densities √S against frequency, both axes logarithmic, thinned to the pixel columns by smallest
 * and largest bin so that a line one bin wide stays. Bins of density zero have no place on the axis and break the line.
 */
export function spectrumFigure(
  curves: readonly SpectrumCurve[],
  viewport: Viewport,
  options: SpectrumFigureOptions = {},
): Figure {
  if (curves.length === 0) throw new RangeError('a spectrum figure needs at least one spectrum');
  const first = curves[0];
  const x = frequencyAxis(frequencyExtent(curves), viewport);
  const columns = columnsOf(x, viewport);
  const bands: Trace[] = [];
  const lines: Trace[] = [];
  for (const { spectrum, role, name, band } of curves) {
    const f = spectrum.frequency;
    const amplitude = spectrum.density.map((s) => (s > 0 ? Math.sqrt(s) : NaN));
    lines.push({ type: 'line', name: name ?? spectrum.label, role, ...thinLine(f, amplitude, columns) });
    if (band === true && spectrum.estimate) {
      const [low, high] = spectrum.estimate.band.map(Math.sqrt) as [number, number];
      bands.push({
        type: 'range',
        name: '90 % interval of one bin',
        role: 'interval',
        ...thinRange(
          f,
          amplitude.map((a) => a * low),
          amplitude.map((a) => a * high),
          columns,
        ),
      });
    }
  }
  return {
    id: options.id ?? 'spectrum',
    title: options.title ?? first.spectrum.label,
    caption: [...curves.map(describe), ...(options.note === undefined ? [] : [options.note])].join(' '),
    x,
    y: {
      label: 'Amplitude spectral density, one-sided',
      unit: amplitudeUnit(first.spectrum.unit),
      scale: 'log',
      extent: extentOf(
        curves.map((c) => c.spectrum.density.map((s) => (s > 0 ? Math.sqrt(s) : NaN))),
        'log',
      ),
    },
    traces: [...bands, ...lines],
    marks: options.marks ?? [],
  };
}

/** From the lowest positive to the highest frequency at which any of the curves has a value. */
function frequencyExtent(curves: readonly SpectrumCurve[]): [number, number] {
  let low = Infinity;
  let high = 0;
  for (const { frequency, density } of curves.map((c) => c.spectrum)) {
    let a = lowerBound(frequency, Number.MIN_VALUE);
    let b = frequency.length - 1;
    while (a < b && Number.isNaN(density[a])) a++;
    while (b > a && Number.isNaN(density[b])) b--;
    if (a <= b) {
      low = Math.min(low, frequency[a]);
      high = Math.max(high, frequency[b]);
    }
  }
  if (low > high) return [1, 10];
  return low < high ? [low, high] : [low / 2, low * 2];
}

function describe({ spectrum, name, band }: SpectrumCurve): string {
  const e = spectrum.estimate;
  const what = `${name ?? spectrum.label}: one-sided amplitude spectral density in ${amplitudeUnit(spectrum.unit)}`;
  if (!e) return `${what}.`;
  const parts = [
    `${what}, ${e.average} of ${e.segments} segments of ${numberText(e.segmentSeconds)} s`,
    `${e.window} window of equivalent noise bandwidth (ENBW) ${numberText(e.enbw)} Hz, bins every ${numberText(spectrum.df)} Hz`,
  ];
  if (band === true) parts.push('shaded the 90 % interval of one bin');
  return `${parts.join(', ')}.`;
}
