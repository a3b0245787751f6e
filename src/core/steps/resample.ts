import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import { spanLength } from '../data/spans';
import { numberText, repeated, withUnit } from '../figures/number-text';
import { seriesFigure } from '../figures/series';
import { planResample } from '../kernels/resample-poly';
import { RunningMoments } from '../look/running-moments';
import { resampleNumbers, resampleWarnings, type ResampleFacts } from '../condition/resample-report';
import { RESAMPLE_PARAMS, STOP_BANDS } from '../condition/resample-params';
import { resampledSeries, wantedRatio } from '../condition/resample-series';
import { sweep } from '../condition/sweep';
import { defineStep } from './define';

export default defineStep({
  id: 'resample',
  title: 'Resample',
  version: 1,
  group: 'condition',
  summary: 'Changes the sample rate through an anti-alias filter without delay.',
  takes: [{ kind: 'series', count: 'one', help: 'the data whose rate is changed' }],
  gives: 'series',
  params: RESAMPLE_PARAMS,
  sources: [
    {
      text: 'Polyphase resampling: Crochiere & Rabiner, Multirate Digital Signal Processing (Prentice-Hall, 1983)',
      flag: 'memory',
    },
    {
      text: 'Kaiser window: Kaiser & Schafer, IEEE Trans. ASSP 28, 105 (1980)',
      flag: 'memory',
    },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const rate = params.rate ?? series.rate / 2;
    const ratio = wantedRatio(series.rate, rate);
    const shape = STOP_BANDS[params['stop-band']];
    const plan = planResample(ratio.up, ratio.down, shape.beta);
    const label = `${series.label} at ${numberText(rate, 9)} Hz`;
    const data = resampledSeries(series, rate, plan, label, context.memoryLimit / 4);
    if (data.valid.length === 0) throw tooShort(series, plan.half / ratio.up);
    const moments = new RunningMoments();
    await sweep(
      data,
      (f) => context.block(f),
      (x) => moments.take(x, 0, x.length),
    );
    const nyquist = Math.min(rate, series.rate) / 2;
    const facts: ResampleFacts = {
      from: series,
      to: data,
      ratio,
      taps: 2 * plan.half + 1,
      edge: plan.half / ratio.up / series.rate,
      cutoff: nyquist,
      clean: shape.clean * nyquist,
      stop: (2 - shape.clean) * nyquist,
      decibel: shape.decibel,
      rms: moments.rms,
    };
    return {
      data,
      sentence: sentence(facts),
      numbers: resampleNumbers(facts),
      warnings: resampleWarnings(facts),
    };
  },
  figures: (data, _params, _inputs, viewport) => [seriesFigure(data, viewport, { title: 'Resampled' })],
});

function tooShort(series: Series, half: number): UserError {
  const longest = series.valid.reduce((n, s) => Math.max(n, s.to - s.from), 0);
  return new UserError(
    longest === 0 ? 'no-data' : 'filter-long',
    longest === 0
      ? `${series.label} has no valid sample: choose another span of the file`
      : `the anti-alias filter reaches over ${numberText((2 * half) / series.rate)} s, more than the longest valid span of ${series.label}, ${numberText(longest / series.rate)} s: take a longer span or a "rate" closer to ${numberText(series.rate, 9)} Hz`,
  );
}

function sentence({ from, to, ratio, taps, edge, cutoff, clean, stop, decibel }: ResampleFacts): string {
  const what = `${from.label} from ${numberText(from.rate, 9)} to ${withUnit(to.rate, 'Hz', 9)}`;
  if (taps === 1) return `${what}: the rate is the same and so are the samples.` + repeated(to.notes);
  return (
    `${what} (${ratio.up}/${ratio.down}), without delay, sample 0 at the same time: ` +
    `sinc of ${taps} taps under a Kaiser window at ${withUnit(Math.max(from.rate * ratio.up, to.rate), 'Hz', 9)}, −6 dB at ${withUnit(cutoff, 'Hz', 9)}, ` +
    `gain within 1 % of 1 up to ${withUnit(clean, 'Hz', 6)}, at least ${decibel} dB down from ${withUnit(stop, 'Hz', 6)} and for all that folds to below ${withUnit(clean, 'Hz', 6)}; ` +
    `${withUnit(edge, 's')} at each end of a valid span dropped (${withUnit(spanLength(to.valid) / to.rate, 's', 9)} stay).` +
    repeated(to.notes)
  );
}
