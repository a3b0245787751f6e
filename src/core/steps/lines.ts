import { UserError } from '../data/errors';
import type { NoiseLine, Series, Spectrum } from '../data/kinds';
import { linesFigure, type LineListDetail } from '../figures/lines';
import { counted, numberText, repeated, withUnit } from '../figures/number-text';
import { addSamples } from '../data/gps-time';
import { windowFigures } from '../kernels/window-figures';
import { makeWindow } from '../kernels/windows';
import { binError } from '../noise/bin-error';
import { detrendedBins } from '../noise/detrended-bins';
import { findFamilies } from '../noise/line-families';
import { LEAST_SIDE } from '../noise/line-floor';
import { binLaw } from '../noise/line-law';
import { partSpectra } from '../noise/line-parts';
import { linesNumbers, linesTables, linesWarnings, type LineFacts } from '../noise/line-report';
import { searchLines } from '../noise/line-search';
import { lineShape, type ShapeInput } from '../noise/line-shape';
import { lineStability } from '../noise/line-stability';
import { neighbourFactor } from '../noise/power-correlation';
import { EXCLUDE_PARAM, OVERLAP_PARAM, WINDOW_PARAM } from '../noise/segment-params';
import { planSegments, type SegmentPlan } from '../noise/segments';
import { bandBins } from '../noise/spectrum-facts';
import { densityUnit } from '../noise/units';
import { welchEstimate } from '../noise/welch-estimate';
import { defineStep } from './define';

/** Bins over which the floor is taken when nothing is said, on each side, and least Hz. */
const SIDE_BINS = 32;
const SIDE_HZ = 3;

export default defineStep({
  id: 'lines',
  title: 'Lines',
  version: 1,
  group: 'noise',
  summary: 'Narrow features above the local noise floor: frequency, width, height, harmonic families, drift.',
  takes: [
    { kind: 'series', count: 'one', help: 'the data whose lines are found' },
    {
      kind: 'spectrum',
      count: 'optional',
      help: 'an estimated spectrum to search instead of one made here; the data then only show whether lines are steady',
    },
  ],
  gives: 'lines',
  params: {
    segment: {
      kind: 'number',
      label: 'Segment',
      unit: 's',
      default: 8,
      min: 0,
      exclusiveMin: true,
      slider: 'log',
      help: 'Length of the pieces that are averaged. Longer ones resolve narrower lines and lift steady ones further above the floor; shorter ones give more averages. Not used with a given spectrum.',
    },
    overlap: OVERLAP_PARAM,
    window: WINDOW_PARAM,
    average: {
      kind: 'choice',
      label: 'Average',
      choices: ['median', 'mean'],
      default: 'median',
      help: 'The median is not moved by a loud transient. The mean shows lines that are there only part of the time. Not used with a given spectrum.',
    },
    'false-alarms': {
      kind: 'number',
      label: 'False alarms',
      unit: '',
      default: 0.1,
      min: 0,
      exclusiveMin: true,
      max: 100,
      slider: 'log',
      help: 'Number of false lines that Gaussian noise may yield in the whole search, on average at most. It sets the threshold over the floor.',
    },
    'floor-width': {
      kind: 'number',
      label: 'Floor over',
      unit: 'Hz',
      default: null,
      min: 0,
      exclusiveMin: true,
      help: 'Full width over which the local floor is taken; features as wide as half of it are floor, not lines. Left empty: 64 bins, but at least 6 Hz.',
    },
    low: {
      kind: 'number',
      label: 'From',
      unit: 'Hz',
      default: null,
      min: 0,
      help: 'Lowest frequency that is searched. Left empty: the lowest that has a floor, 12 bins above those that detrending changes.',
    },
    high: {
      kind: 'number',
      label: 'To',
      unit: 'Hz',
      default: null,
      min: 0,
      exclusiveMin: true,
      help: 'Highest frequency that is searched. Left empty: 12 bins below half the sample rate.',
    },
    mains: {
      kind: 'list',
      label: 'Mains',
      unit: 'Hz',
      each: 1,
      default: [50, 60],
      min: 1,
      help: 'Mains frequencies whose multiples are looked for, within 0.1 %. Multiples of the lines themselves are always looked for.',
    },
    exclude: EXCLUDE_PARAM,
  },
  sources: [
    {
      text: 'Averaged periodograms: Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967)',
      flag: 'memory',
    },
    {
      text: 'Law of a median: order statistics, David & Nagaraja, Order Statistics (2003), 2.1',
      flag: 'memory',
    },
    {
      text: 'Width of a line seen through a window: Olivero & Longbothum, J. Quant. Spectrosc. Radiat. Transf. 17, 233 (1977)',
      flag: 'memory',
    },
    {
      text: 'Search, families and their probability by coincidence: own, checked by simulation',
      flag: 'computed',
    },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const given = inputs.optional('spectrum');
    const e = given?.estimate;
    if (given && (!e || !(given.df > 0)))
      throw new UserError(
        'not-an-estimate',
        `${given.label} is not an averaged estimate on even bins, so that no threshold can be stated for it; feed in a spectrum of the step "noise-spectrum" or none`,
      );
    const windowName = (e?.window ?? params.window) as typeof params.window;
    const overlap = e?.overlap ?? params.overlap;
    const average = e?.average ?? params.average;
    const plan = planSegments(series, e?.segmentSeconds ?? params.segment, overlap, params.exclude);
    const window = makeWindow(windowName, plan.size);
    const figures = windowFigures(window);
    const spectrum = given ?? (await ownEstimate());
    const { density, frequency, df } = spectrum;
    const estimate = spectrum.estimate!;
    if (estimate.segments < 4)
      throw new UserError(
        'few-segments',
        `${counted(estimate.segments, 'segment')} of ${numberText(estimate.segmentSeconds)} s, and at least 4 are needed to tell a line from chance; set "segment" to ${numberText((estimate.segmentSeconds * estimate.segments) / 16, 2)} s or less`,
      );

    const margin = detrendedBins(windowName) + 1;
    const usable: [number, number] = [margin, density.length - margin];
    const asked = bandBins(frequency, [params.low ?? 0, params.high ?? Infinity]);
    const searched: [number, number] = [
      Math.max(asked[0], usable[0] + LEAST_SIDE),
      Math.min(asked[1], usable[1] - LEAST_SIDE),
    ];
    if (searched[1] - searched[0] < 1)
      throw new UserError(
        'empty-band',
        `no bin to search from ${numberText(params.low ?? 0)} to ${numberText(params.high ?? estimate.rate / 2)} Hz; bins with a floor are every ${numberText(df)} Hz from ${numberText((usable[0] + LEAST_SIDE) * df)} to ${numberText((usable[1] - LEAST_SIDE - 1) * df)} Hz`,
      );
    const half =
      params['floor-width'] === null
        ? Math.max(SIDE_BINS, Math.round(SIDE_HZ / df))
        : Math.max(LEAST_SIDE, Math.round(params['floor-width'] / df / 2));
    const neighbours = neighbourFactor(window);
    const v = estimate.relativeError ** 2;
    // The floor is a median of 2 half bins that are correlated: its own scatter widens that of the ratio.
    const law = binLaw(average, v * (1 + (Math.PI / 2) * (neighbours / (2 * half))));
    const bins = searched[1] - searched[0];
    const threshold = law.above(Math.min(0.5, params['false-alarms'] / bins));
    const reach = Math.max(2, Math.ceil(2 * figures.enbw - 1e-9));
    const found = searchLines(density, usable, searched, half, binLaw(average, v).median, threshold, reach);

    const parts = await partSpectra(
      series,
      plan,
      window,
      average,
      context.kernels,
      context.memoryLimit,
      (f) => context.block(given ? f : (1 + f) / 2),
    );
    const shared = { floor: found.floor, df, lobe: figures.bandwidth3, neighbours };
    const whole: ShapeInput = { ...shared, density, relativeError: estimate.relativeError };
    const shapes = found.peaks.map((p, i) => {
      const low = Math.max(usable[0], i > 0 ? Math.ceil((found.peaks[i - 1].at + p.at) / 2) : 0);
      const high = Math.min(
        usable[1],
        i + 1 < found.peaks.length ? Math.floor((found.peaks[i + 1].at + p.at) / 2) + 1 : Infinity,
      );
      const shape = lineShape(whole, p, low, high);
      const reachOf = Math.max(2, Math.ceil(shape.unresolved ? 0 : shape.width / df));
      const stability = lineStability(
        parts.map((part) => {
          let at = p.at;
          for (let k = Math.max(low, p.at - reachOf); k < Math.min(high, p.at + reachOf + 1); k++)
            if (part.density[k] > part.density[at]) at = k;
          const s = lineShape({ ...shared, ...part }, { ...p, at }, low, high);
          return { shape: s, peak: part.density[at] };
        }),
        parts.length > 0 ? parts[0].relativeError : NaN,
        df,
        found.peaks.length,
      );
      return { shape, stability };
    });
    const families = findFamilies(
      shapes.map((s) => s.shape),
      params.mains,
      df,
    );
    const lines = shapes.map(({ shape, stability }, i): NoiseLine => {
      const family = families.find((f) => f.members.some((m) => m.line === i));
      return {
        ...shape,
        q: shape.frequency / shape.width,
        stability: stability.stability,
        ...(family
          ? {
              family: {
                fundamental: family.fundamental,
                harmonic: family.members.find((m) => m.line === i)!.harmonic,
              },
            }
          : {}),
      };
    });
    const facts: LineFacts = {
      lines,
      families,
      wander: shapes.map((s) => s.stability.wander),
      heights: shapes.map((s) => s.stability.heights),
      threshold,
      falseAlarms: params['false-alarms'],
      bins,
      band: [frequency[searched[0]], frequency[searched[1] - 1]],
      averages: 1 / v,
      taken: found.taken,
      df,
      segmentSeconds: estimate.segmentSeconds,
      parts: parts.length,
      unit: series.unit === '' ? '' : `${series.unit}²`,
    };
    const data: LineListDetail = {
      kind: 'lines',
      label: `lines of ${series.label}`,
      lines,
      spectrum,
      floor: found.floor,
      threshold,
    };
    return {
      data,
      sentence:
        `${counted(lines.length, 'line')} in the ${average} of ${counted(estimate.segments, 'segment')} of ${numberText(estimate.segmentSeconds, 9)} s, ${estimate.window} window, of ${series.label}: ` +
        `one-sided density above ${numberText(threshold, 3)} times the local floor, a running median over ${withUnit(2 * half * df, 'Hz')}; at most ${numberText(params['false-alarms'])} false ones expected in ${counted(bins, 'bin')}` +
        `; ${counted(families.length, 'harmonic family', 'harmonic families')}.` +
        repeated(series.notes),
      numbers: linesNumbers(facts),
      warnings: linesWarnings(facts),
      tables: linesTables(facts),
    };

    async function ownEstimate(): Promise<Spectrum> {
      const result = await welchEstimate(series, plan, context.kernels, {
        average,
        window,
        detrend: 'constant',
        watch: [],
        memoryLimit: context.memoryLimit,
        block: (f) => context.block(f / 2),
      });
      return asSpectrum(series, plan, result.density, window, windowName, average, figures.enbw);
    }
  },
  figures: (data, _params, _inputs, viewport) => [linesFigure(data, viewport)],
});

function asSpectrum(
  series: Series,
  plan: SegmentPlan,
  density: Float64Array,
  window: Float64Array,
  windowName: string,
  average: 'median' | 'mean' | 'median-mean',
  enbw: number,
): Spectrum {
  const df = series.rate / plan.size;
  const error = binError(average, plan.starts.length, window, plan.step);
  const from = plan.used[0].from;
  return {
    kind: 'spectrum',
    label: `noise of ${series.label}`,
    frequency: Float64Array.from(density, (_, k) => k * df),
    density,
    df,
    unit: densityUnit(series.unit),
    estimate: {
      average,
      segments: plan.starts.length,
      segmentSeconds: plan.size / series.rate,
      overlap: 1 - plan.step / plan.size,
      window: windowName,
      enbw: enbw * df,
      relativeError: error.relative,
      band: error.band,
      start: addSamples(series.start, from, series.rate),
      duration: (plan.used.at(-1)!.to - from) / series.rate,
      rate: series.rate,
    },
  };
}
