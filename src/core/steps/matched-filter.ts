import { UserError } from '../data/errors';
import { formatGps, utcText } from '../data/gps-time';
import type { SnrSeries } from '../data/kinds';
import { complementSpans, intersectSpans } from '../data/spans';
import { numberText, repeated, withUnit } from '../figures/number-text';
import { snrFigure } from '../figures/snr';
import { ownSpectrum } from '../noise/own-spectrum';
import { designFilter, type FilterDesign } from '../search/matched-filter-design';
import { filterNumbers, noiseLevel, peakTable, timeOf } from '../search/matched-filter-numbers';
import { MATCHED_FILTER_PARAMS } from '../search/matched-filter-params';
import { filterWarnings } from '../search/matched-filter-warnings';
import { correlate, keptSpans, planBlocks } from '../search/overlap-save';
import { loudestPeaks, rayleighFacts } from '../search/peaks';
import { templateOf } from '../search/template';
import { defineStep } from './define';

/** Share of the work that goes into the own spectrum. */
const SPECTRUM_SHARE = 0.2;

export default defineStep({
  id: 'matched-filter',
  title: 'Matched filter',
  version: 1,
  group: 'search',
  summary: 'Complex signal-to-noise ratio of one template against time, with its loudest peaks.',
  takes: [
    { kind: 'series', count: 'one', help: 'the data searched' },
    { kind: 'waveform', count: 'one', help: 'the template' },
    { kind: 'spectrum', count: 'optional', help: 'their noise; left out, the median spectrum of the data' },
  ],
  gives: 'snr',
  params: MATCHED_FILTER_PARAMS,
  sources: [
    {
      text: 'Matched filter, Rayleigh statistics: Allen et al., Phys. Rev. D 85, 122006 (2012)',
      flag: 'memory',
    },
    {
      text: 'Level noise reaches once: Rice, Bell Syst. Tech. J. 24, 46 (1945)',
      flag: 'memory',
    },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    if (16 * series.length > context.memoryLimit)
      throw new UserError(
        'span-long',
        `the ratio of ${numberText(series.length / series.rate)} s at ${withUnit(series.rate, 'Hz')} takes ${numberText((16 * series.length) / 2 ** 20, 3)} MiB, more than the ${numberText(context.memoryLimit / 2 ** 20, 3)} MiB a step may use: resample first, or take a shorter span`,
      );
    const given = inputs.optional('spectrum');
    const share = given ? 0 : SPECTRUM_SHARE;
    const spectrum =
      given ??
      (await ownSpectrum(series, params.segment, context.kernels, context.memoryLimit, (f) =>
        context.block(share * f, 'noise spectrum'),
      ));
    const longest = series.valid.reduce((n, s) => Math.max(n, s.to - s.from), 0);
    if (longest === 0)
      throw new UserError('no-data', `${series.label} has no valid sample: choose another span of the file`);
    const template = templateOf(inputs.one('waveform'));
    const design = designFilter(context.kernels, template, spectrum, series.rate, longest, params);
    const blocks = planBlocks(series.valid, design);
    if (blocks.length === 0) throw tooShort(template.label, design, longest);
    const re = new Float64Array(series.length).fill(NaN);
    const im = new Float64Array(series.length).fill(NaN);
    await correlate(context.kernels, series, design.filter, design, blocks, { re, im }, (f) =>
      context.block(share + (1 - share) * f),
    );
    const valid = keptSpans(blocks);
    const spoilt = intersectSpans(
      [...series.valid, ...(series.spoilt ?? [])],
      complementSpans(valid, series.length),
    );
    const snr: SnrSeries = {
      kind: 'snr',
      label: `SNR of ${template.label} in ${series.label}`,
      channel: series.channel,
      rate: series.rate,
      start: series.start,
      ...(series.startUnknown === true ? { startUnknown: true } : {}),
      length: series.length,
      re,
      im,
      valid,
      spoilt,
      ...(series.notes ? { notes: series.notes } : {}),
      peaks: loudestPeaks({ re, im }, valid, params.window * series.rate, params.count),
      template: {
        label: template.label,
        origin: template.origin,
        sigma: design.sigma,
        ...(template.distance === undefined ? {} : { distance: template.distance }),
      },
      filter: {
        series,
        size: design.size,
        re: design.re,
        im: design.im,
        inverse: design.inverse,
        low: design.band[0],
        high: design.band[1],
        bandwidth: design.bandwidth,
        spread: design.spread,
        lead: design.lead,
        tail: design.tail,
        fade: design.fade,
      },
    };
    const rayleigh = rayleighFacts(snr, valid);
    const { variance } = design;
    return {
      data: snr,
      sentence: sentence(snr, spectrum.label, params.reach),
      numbers: filterNumbers({ snr, rayleigh, variance }),
      warnings: filterWarnings({
        snr,
        spectrum,
        rayleigh,
        variance,
        asked: [params.low, params.high],
        reach: params.reach,
      }),
      tables: [peakTable(snr)],
    };
  },
  figures(snr, _params, _inputs, viewport) {
    return [snrFigure(snr, noiseLevel(snr), viewport)];
  },
});

function tooShort(label: string, design: FilterDesign, longest: number): UserError {
  const needs = (design.lead + design.tail + 2 * design.fade) / design.rate;
  return new UserError(
    'template-long',
    `${label} with its noise filter needs ${numberText(needs)} s of data around a value, and the longest valid span has ${numberText(longest / design.rate)} s: take a longer span, raise "low", or lower "reach"`,
  );
}

function sentence(snr: SnrSeries, noise: string, reach: number): string {
  const { filter, peaks, template } = snr;
  const top = peaks.at(0);
  const at = top && timeOf(snr, top.at);
  const where =
    top && at
      ? ` Loudest: ${numberText(top.snr)} at GPS ${formatGps(at)}${snr.startUnknown === true ? '' : ` (${utcText(at)})`}, the time of its ${template.origin}.`
      : '';
  return (
    `${snr.filter.series.label} matched with ${template.label}, both phases, from ${numberText(filter.low)} to ${withUnit(filter.high, 'Hz')}, ` +
    `over the one-sided ${noise}, its inverse held to ${numberText(reach)} s either side; in blocks of ${numberText(filter.size / snr.rate)} s, ` +
    `with ${numberText((filter.lead + filter.fade) / snr.rate)} s dropped after and ${numberText((filter.tail + filter.fade) / snr.rate)} s before each gap.` +
    where +
    repeated(snr.notes)
  );
}
