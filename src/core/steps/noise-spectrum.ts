import { UserError } from '../data/errors';
import { addSamples } from '../data/gps-time';
import type { Series, Spectrum, SpectrumEstimate } from '../data/kinds';
import { spanLength } from '../data/spans';
import type { Mark } from '../figures/figure';
import { counted, numberText, repeated, withUnit } from '../figures/number-text';
import { spectrumFigure } from '../figures/spectrum';
import { makeWindow } from '../kernels/windows';
import { windowFigures } from '../kernels/window-figures';
import { binError } from '../noise/bin-error';
import { detrendedBins } from '../noise/detrended-bins';
import { leakedShare } from '../noise/leakage';
import { planSegments, type SegmentPlan } from '../noise/segments';
import { bandBins, floorBand, spectrumFacts } from '../noise/spectrum-facts';
import { spectrumNumbers } from '../noise/spectrum-numbers';
import { SPECTRUM_PARAMS } from '../noise/spectrum-params';
import { spectrumWarnings } from '../noise/spectrum-warnings';
import { loudestOctave, watchedOctaves } from '../noise/steadiness';
import { amplitudeUnit, densityUnit } from '../noise/units';
import { welchEstimate } from '../noise/welch-estimate';
import { defineStep } from './define';

export default defineStep({
  id: 'noise-spectrum',
  title: 'Noise spectrum',
  version: 1,
  group: 'noise',
  summary: 'One-sided noise density by averaging windowed, overlapping segments, with its error.',
  takes: [{ kind: 'series', count: 'one', help: 'the data whose noise is estimated' }],
  gives: 'spectrum',
  params: SPECTRUM_PARAMS,
  sources: [
    {
      text: 'Averaged periodograms: Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967)',
      flag: 'memory',
    },
    {
      text: 'Density, noise bandwidth: Heinzel, Rüdiger, Schilling, report of 15 Feb 2002 (abstract)',
      flag: 'read',
    },
    {
      text: 'Bias of the median, median-mean: Allen et al., Phys. Rev. D 85, 122006 (2012), App. B, as cited in SciPy',
      flag: 'read',
    },
    { text: 'Windows: Harris, Proc. IEEE 66, 51 (1978)', flag: 'memory' },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const plan = planSegments(series, params.segment, params.overlap, params.exclude);
    const window = makeWindow(params.window, plan.size);
    const df = series.rate / plan.size;
    const frequency = Float64Array.from({ length: Math.floor(plan.size / 2) + 1 }, (_, k) => k * df);
    const band = floorBand(series.rate, params.low, params.high);
    checkBand(band, frequency);
    const { enbw } = windowFigures(window);
    const octaves = watchedOctaves(frequency.length, enbw);
    const estimate = await welchEstimate(series, plan, context.kernels, {
      average: params.average,
      window,
      detrend: params.detrend,
      watch: octaves,
      memoryLimit: context.memoryLimit,
      block: (fraction, note) => context.block(fraction, note),
    });
    const error = binError(params.average, plan.starts.length, window, plan.step);
    const facts0: SpectrumEstimate = {
      average: params.average,
      segments: plan.starts.length,
      segmentSeconds: plan.size / series.rate,
      overlap: 1 - plan.step / plan.size,
      window: params.window,
      enbw: enbw * df,
      relativeError: error.relative,
      band: error.band,
      ...usedSpan(series, plan),
      rate: series.rate,
    };
    const spectrum: Spectrum = {
      kind: 'spectrum',
      label: `noise of ${series.label}`,
      frequency,
      density: estimate.density,
      df,
      unit: densityUnit(series.unit),
      estimate: facts0,
    };
    const detrended = params.detrend === 'constant' ? detrendedBins(params.window) : 0;
    const facts = spectrumFacts(spectrum, band, detrended);
    return {
      data: spectrum,
      sentence: sentence(spectrum, facts0, plan, series, estimate.passes),
      numbers: spectrumNumbers(spectrum, facts0, facts, error, estimate.moments.deviation),
      warnings: spectrumWarnings({
        series,
        plan,
        estimate,
        facts,
        error,
        average: params.average,
        window: params.window,
        segmentSeconds: facts0.segmentSeconds,
        exclude: params.exclude,
        detrended,
        loudest: loudestOctave(octaves, estimate.watched, df),
        leaked: leakedShare(context.kernels, window, estimate.density, facts.bins),
      }),
    };
  },
  figures(spectrum, params, _inputs, viewport) {
    const bins = params.detrend === 'constant' ? detrendedBins(params.window) : 0;
    const marks: Mark[] =
      bins > 1
        ? [
            {
              role: 'cropped',
              from: spectrum.df / 2,
              to: (bins - 0.5) * spectrum.df,
              label: 'lowered by detrending',
            },
          ]
        : [];
    return [
      spectrumFigure([{ spectrum, role: 'data', band: true }], viewport, {
        title: 'Noise spectrum',
        marks,
        ...(bins > 0
          ? {
              note: `Detrending lowers the ${bins === 1 ? 'bin at zero frequency' : `lowest ${bins} bins, zero frequency included`}.`,
            }
          : {}),
      }),
    ];
  },
});

function checkBand(band: readonly [number, number], frequency: Float64Array): void {
  const [from, to] = bandBins(frequency, band);
  if (to > from) return;
  throw new UserError(
    'empty-band',
    `no bin lies between "low" ${numberText(band[0])} Hz and "high" ${numberText(band[1])} Hz; bins are every ${numberText(frequency[1])} Hz up to ${numberText(frequency.at(-1)!)} Hz`,
  );
}

function usedSpan(series: Series, plan: SegmentPlan): Pick<SpectrumEstimate, 'start' | 'duration'> {
  const from = plan.used[0].from;
  const to = plan.used.at(-1)!.to;
  return { start: addSamples(series.start, from, series.rate), duration: (to - from) / series.rate };
}

function sentence(
  spectrum: Spectrum,
  e: SpectrumEstimate,
  plan: SegmentPlan,
  series: Series,
  passes: number,
): string {
  const left = plan.excluded.length;
  return (
    `${e.average === 'mean' ? 'Mean' : e.average === 'median' ? 'Median (bias removed)' : 'Mean of two medians (bias removed)'} of ${counted(e.segments, 'segment')} ` +
    `of ${numberText(e.segmentSeconds, 9)} s, ${e.window} window, overlap ${numberText(e.overlap, 3)}, ` +
    `from ${numberText(spanLength(plan.used) / series.rate, 9)} s of ${series.label}: one-sided density in ${spectrum.unit} ` +
    `(drawn as its root in ${amplitudeUnit(spectrum.unit)}), resolution ${withUnit(e.enbw, 'Hz')}` +
    (left === 0 ? '' : `; ${counted(left, 'span')} left out`) +
    (passes === 1 ? '.' : `; read ${passes} times to stay within the memory limit.`) +
    repeated(series.notes)
  );
}
