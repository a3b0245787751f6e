import { filteredSeries, filteredSpans } from '../condition/symmetric-filter';
import { inherited } from '../condition/block-series';
import { sweep } from '../condition/sweep';
import { designWhitening } from '../condition/whiten-design';
import { WHITEN_PARAMS } from '../condition/whiten-params';
import { whitenNumbers, type WhitenFacts } from '../condition/whiten-report';
import { whiteStatistics } from '../condition/whiten-statistics';
import { whitenWarnings } from '../condition/whiten-warnings';
import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import { spanLength } from '../data/spans';
import { numberText, repeated, withUnit } from '../figures/number-text';
import { seriesFigure } from '../figures/series';
import { ownSpectrum } from '../noise/own-spectrum';
import { defineStep } from './define';

/** Share of the work that goes into the own spectrum. */
const SPECTRUM_SHARE = 0.5;

export default defineStep({
  id: 'whiten',
  title: 'Whiten',
  version: 1,
  group: 'condition',
  summary: 'Divides by the noise: a series with the same density at all frequencies kept, unit variance.',
  takes: [
    { kind: 'series', count: 'one', help: 'the data to whiten' },
    { kind: 'spectrum', count: 'optional', help: 'their noise; left out, the median spectrum of the data' },
  ],
  gives: 'series',
  params: WHITEN_PARAMS,
  sources: [
    {
      text: 'Inverse spectrum truncated in time: Allen et al., Phys. Rev. D 85, 122006 (2012)',
      flag: 'memory',
    },
    { text: 'Window of the truncation: Harris, Proc. IEEE 66, 51 (1978)', flag: 'memory' },
    {
      text: 'Density 2/rate in the band kept, filter symmetric in time: common practice',
      flag: 'common practice',
    },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const { kernels, memoryLimit } = context;
    const { low, high, reach } = params;
    checkBand(series, low, high);
    const given = inputs.optional('spectrum');
    const share = given ? 0 : SPECTRUM_SHARE;
    const spectrum =
      given ??
      (await ownSpectrum(series, params.segment, kernels, memoryLimit / 2, (f) =>
        context.block(share * f, 'noise spectrum'),
      ));
    const design = designWhitening(kernels, spectrum, series.rate, low, high ?? Infinity, reach);
    const spans = filteredSpans(series, design.taps.length - 1);
    if (spans.valid.length === 0) throw tooShort(series, reach);
    const data = filteredSeries(
      kernels,
      series,
      design.taps,
      {
        ...inherited(series),
        label: `whitened ${series.label}`,
        unit: '',
        rate: series.rate,
        length: series.length,
        ...spans,
      },
      memoryLimit / 4,
    );
    const taker = whiteStatistics(
      spanLength(data.valid),
      series.rate / 2 / (design.band[1] - design.band[0]),
    );
    await sweep(
      data,
      (f) => context.block(share + (1 - share) * f),
      (x) => taker.take(x),
    );
    const facts: WhitenFacts = {
      from: series,
      to: data,
      spectrum,
      own: given === undefined,
      design,
      statistics: taker.result(),
      asked: [low, high],
      reach,
    };
    return {
      data,
      sentence: sentence(facts),
      numbers: whitenNumbers(facts),
      warnings: whitenWarnings(facts),
    };
  },
  figures: (data, _params, _inputs, viewport) => [
    seriesFigure(data, viewport, {
      title: 'Whitened',
      note: 'In standard deviations of white noise over the full band.',
    }),
  ],
});

function checkBand({ rate, label }: Series, low: number, high: number | null): void {
  if (low < (high ?? Infinity) && low < rate / 2) return;
  throw new UserError(
    'band-empty',
    high !== null && low >= high
      ? `"low" is ${withUnit(low, 'Hz')} and "high" ${withUnit(high, 'Hz')}: "low" must be the smaller`
      : `"low" is ${withUnit(low, 'Hz')}, but ${label} ends at ${withUnit(rate / 2, 'Hz')}, half its sample rate`,
  );
}

function tooShort(series: Series, reach: number): UserError {
  const longest = series.valid.reduce((n, s) => Math.max(n, s.to - s.from), 0) / series.rate;
  return new UserError(
    longest === 0 ? 'no-data' : 'filter-long',
    longest === 0
      ? `${series.label} has no valid sample: choose another span of the file`
      : `the filter reaches ${numberText(reach)} s to either side, and the longest valid span of ${series.label} has ${numberText(longest)} s: take a longer span or lower "reach"`,
  );
}

function sentence({ from, to, spectrum, design, reach, statistics: s }: WhitenFacts): string {
  const [low, high] = design.band;
  return (
    `${from.label} whitened with ${spectrum.label} from ${numberText(low)} to ${withUnit(high, 'Hz')} by a filter symmetric in time (no delay) that reaches ${numberText(reach)} s to either side, ` +
    `resolution ${withUnit(design.resolution, 'Hz')}: one-sided density 2/rate in the band, so variance 1 over all of 0 to ${withUnit(design.rate / 2, 'Hz')} and ${numberText(design.ideal)} over this band if perfectly white, ${numberText(design.variance)} with what the filter does not resolve; found ${numberText(s.variance)}. ` +
    `${withUnit((design.taps.length - 1) / design.rate, 's')} at each end of a valid span dropped (${withUnit(spanLength(to.valid) / to.rate, 's', 9)} stay).` +
    repeated(to.notes)
  );
}
