import type { Series, Spectrum } from '../data/kinds';
import { addSamples } from '../data/gps-time';
import { numberText } from '../figures/number-text';
import { makeWindow } from '../kernels/windows';
import { windowFigures } from '../kernels/window-figures';
import type { Kernels } from '../kernels/kernels';
import { binError } from './bin-error';
import { planSegments } from './segments';
import { densityUnit } from './units';
import { welchEstimate } from './welch-estimate';

/**
 * The series' own noise spectrum, to filter it with: median of half-overlapping Hann segments, because a loud signal moves the
 * mean but hardly the median.
 *
 * @param seconds length of a segment
 */
export async function ownSpectrum(
  series: Series,
  seconds: number,
  kernels: Kernels,
  memoryLimit: number,
  report: (fraction: number) => Promise<void>,
): Promise<Spectrum> {
  const plan = planSegments(series, seconds, 0.5, []);
  const window = makeWindow('hann', plan.size);
  const { density } = await welchEstimate(series, plan, kernels, {
    average: 'median',
    window,
    detrend: 'constant',
    watch: [],
    memoryLimit,
    block: report,
  });
  const df = series.rate / plan.size;
  const error = binError('median', plan.starts.length, window, plan.step);
  const from = plan.used[0].from;
  return {
    kind: 'spectrum',
    label: `own median spectrum of ${series.label} (${plan.starts.length} Hann segments of ${numberText(plan.size / series.rate)} s)`,
    frequency: Float64Array.from(density, (_, k) => k * df),
    density,
    df,
    unit: densityUnit(series.unit),
    estimate: {
      average: 'median',
      segments: plan.starts.length,
      segmentSeconds: plan.size / series.rate,
      overlap: 0.5,
      window: 'hann',
      enbw: windowFigures(window).enbw * df,
      relativeError: error.relative,
      band: error.band,
      start: addSamples(series.start, from, series.rate),
      duration: (plan.used.at(-1)!.to - from) / series.rate,
      rate: series.rate,
    },
  };
}
