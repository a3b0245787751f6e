import { UserError } from '../data/errors';
import { addSamples } from '../data/gps-time';
import type { Trend } from '../data/kinds';
import { trendFigure } from '../figures/trend';
import { counted, numberText, repeated, withUnit } from '../figures/number-text';
import { makeWindow } from '../kernels/windows';
import { EXCLUDE_PARAM, OVERLAP_PARAM, WINDOW_PARAM } from '../noise/segment-params';
import { BandTrends, type BandSum } from '../noise/stationarity-bands';
import {
  stationarityNumbers,
  stationarityTable,
  stationarityWarnings,
  type StationarityFacts,
} from '../noise/stationarity-report';
import { steadinessOf } from '../noise/stationarity-test';
import { planStrides } from '../noise/stride-plan';
import { stridePowers } from '../noise/stride-powers';
import { defineStep } from './define';

interface StrideTrend extends Trend {
  /** Length of the data. */
  readonly seconds: number;
}

/** Fewest bins of a band. */
const BINS = 4;

export default defineStep({
  id: 'stationarity',
  title: 'Stationarity',
  version: 1,
  group: 'noise',
  summary: 'Power in bands and relative reach against time, with the scatter that steady noise would have.',
  takes: [{ kind: 'series', count: 'one', help: 'the data watched' }],
  gives: 'trend',
  params: {
    bands: {
      kind: 'list',
      label: 'Bands',
      unit: 'Hz',
      each: 2,
      default: [20, 60, 60, 300, 300, 1000],
      min: 0,
      help: 'Bands whose power is followed, as pairs of Hz. What reaches half the sample rate is cut there; bands wholly above are left out. A line much narrower than 1/segment rings on from segment to segment and scatters more by itself: choose bands between strong lines, or take them out first.',
    },
    stride: {
      kind: 'number',
      label: 'Stride',
      unit: 's',
      default: 8,
      min: 0,
      exclusiveMin: true,
      slider: 'log',
      ask: true,
      help: 'Seconds per value. Shorter strides show shorter changes and scatter more by themselves.',
    },
    segment: {
      kind: 'number',
      label: 'Segment',
      unit: 's',
      default: 1,
      min: 0,
      exclusiveMin: true,
      help: 'Length of the pieces averaged within a stride.',
    },
    overlap: OVERLAP_PARAM,
    window: WINDOW_PARAM,
    'reach-from': {
      kind: 'number',
      label: 'Reach from',
      unit: 'Hz',
      default: 20,
      min: 0,
      exclusiveMin: true,
      help: 'Lowest frequency counted in the relative reach √∫ f^(−7/3)/S df, to which the distance of a light binary’s inspiral is proportional.',
    },
    exclude: EXCLUDE_PARAM,
  },
  sources: [
    {
      text: 'Variance of overlapped averages: Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967)',
      flag: 'memory',
    },
    {
      text: 'Reach of an inspiral ∝ √∫ f^(−7/3)/S df: Finn & Chernoff, Phys. Rev. D 47, 2198 (1993)',
      flag: 'memory',
    },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const { rate } = series;
    const excluded = params.exclude.reduce<{ from: number; to: number }[]>((out, v, i, all) => {
      if (i % 2 === 0) out.push({ from: Math.floor(v * rate), to: Math.ceil(all[i + 1] * rate) });
      return out;
    }, []);
    const plan = planStrides(series, params.stride, params.segment, params.overlap, excluded);
    const df = rate / plan.size;
    const sums = bandSums(params.bands, params['reach-from'], df, plan.size);
    const window = makeWindow(params.window, plan.size);
    const trends = new BandTrends(plan, sums);
    await stridePowers(
      series,
      plan,
      context.kernels,
      window,
      (f) => context.block(f),
      (stride, power) => trends.take(stride, power),
    );
    const found = steadinessOf(trends.result(window));
    const strideSeconds = plan.stride / rate;
    const empty = plan.segments.filter((n) => n === 0).length;
    const facts: StationarityFacts = {
      found,
      strideSeconds,
      strides: plan.strides,
      empty,
      start: addSamples(series.start, 0, rate),
    };
    const data: StrideTrend = {
      kind: 'trend',
      label: `stationarity of ${series.label}`,
      start: series.start,
      time: Float64Array.from({ length: plan.strides }, (_, k) => (k + 0.5) * strideSeconds),
      curves: found.map(({ trend }, i) => ({
        id: String(i + 1),
        label: trend.label,
        unit: '',
        values: trend.values,
        expected: trend.expected,
      })),
      seconds: series.length / rate,
    };
    const worst = found.reduce((a, b) => (b.excess > a.excess ? b : a));
    return {
      data,
      sentence:
        `${counted(plan.strides - empty, 'stride')} of ${withUnit(strideSeconds, 's')} of ${series.label}, each the mean of segments of ${withUnit(plan.size / rate, 's')} (${params.window} window, overlap ${numberText(params.overlap)}): ` +
        `${worst.trend.label} moves most, by ${numberText(worst.excess, 3)} times what steady Gaussian noise would (chance ${numberText(worst.pValue, 2)}).` +
        repeated(series.notes),
      numbers: stationarityNumbers(facts),
      warnings: stationarityWarnings(facts),
      tables: [stationarityTable(facts)],
    };
  },
  figures: (data, _params, _inputs, viewport) =>
    data.curves.map((c) =>
      trendFigure(
        data,
        c,
        'seconds' in data ? (data as StrideTrend).seconds : data.time[data.time.length - 1],
        viewport,
      ),
    ),
});

/** Bands as sums over bins, and the relative reach. */
function bandSums(bands: readonly number[], reachFrom: number, df: number, size: number): BandSum[] {
  const last = Math.ceil(size / 2);
  const out: BandSum[] = [];
  for (let i = 0; i < bands.length; i += 2) {
    const [low, high] = [bands[i], Math.min(bands[i + 1], last * df)];
    if (low >= bands[i + 1])
      throw new UserError(
        'band-empty',
        `the band from ${numberText(low)} to ${numberText(bands[i + 1])} Hz is empty: the lower edge comes first`,
      );
    if (low >= last * df) continue;
    const from = Math.max(1, Math.ceil(low / df - 1e-9));
    const to = Math.min(last, Math.floor(high / df + 1e-9) + 1);
    if (to - from < BINS)
      throw new UserError(
        'band-narrow',
        `the band from ${numberText(low)} to ${numberText(high)} Hz holds ${counted(Math.max(0, to - from), 'bin')} of ${numberText(df)} Hz; at least ${BINS} are needed: widen it or lengthen "segment"`,
      );
    out.push({
      label: `power from ${numberText(low)} to ${numberText(high)} Hz`,
      band: [low, high],
      from,
      to,
      weigh: (p) => p,
      exponent: 1,
    });
  }
  const from = Math.max(1, Math.ceil(reachFrom / df - 1e-9));
  if (last - from >= BINS)
    out.push({
      label: `relative reach from ${numberText(reachFrom)} Hz`,
      band: [reachFrom, last * df],
      from,
      to: last,
      weigh: (p, k) => (p > 0 ? (k * df) ** (-7 / 3) / p : 0),
      exponent: 0.5,
      inverse: true,
    });
  if (out.length === 0)
    throw new UserError(
      'band-empty',
      `no band lies below half the sample rate, ${numberText(last * df)} Hz: set "bands"`,
    );
  return out;
}
