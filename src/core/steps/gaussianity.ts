import { UserError } from '../data/errors';
import { spanLength } from '../data/spans';
import { counted, numberText, repeated } from '../figures/number-text';
import { statisticFigure, type StatisticDetail } from '../figures/statistic';
import { windowFigures } from '../kernels/window-figures';
import { makeWindow } from '../kernels/windows';
import { detrendedBins } from '../noise/detrended-bins';
import { frequencyRanges } from '../noise/frequency-ranges';
import {
  gaussianityNumbers,
  gaussianityTable,
  gaussianityWarnings,
  RANGE_WORDS,
  type GaussianityFacts,
} from '../noise/gaussianity-report';
import { ratioLaw, ratioQuantile } from '../noise/magnitude-ratio';
import { neighbourFactor } from '../noise/power-correlation';
import { EXCLUDE_PARAM, OVERLAP_PARAM, WINDOW_PARAM } from '../noise/segment-params';
import { streamSegments } from '../noise/segment-stream';
import { planSegments } from '../noise/segments';
import { bandBins } from '../noise/spectrum-facts';
import { defineStep } from './define';

/** Fewest segments for which the law of the ratio is good. */
const FEWEST = 8;

export default defineStep({
  id: 'gaussianity',
  title: 'Gaussianity',
  version: 1,
  group: 'noise',
  summary: 'Whether the magnitude at each frequency fluctuates as Gaussian noise does, or less or more.',
  takes: [{ kind: 'series', count: 'one', help: 'the data whose noise is judged' }],
  gives: 'statistic',
  params: {
    segment: {
      kind: 'number',
      label: 'Segment',
      unit: 's',
      default: 2,
      min: 0,
      exclusiveMin: true,
      slider: 'log',
      help: 'Length of the pieces whose magnitudes are compared. Bursts shorter than a segment show best when it is about as long as they are; steady lines show best with long ones. At least 8 segments must fit, 30 or more are worth having.',
    },
    overlap: OVERLAP_PARAM,
    window: WINDOW_PARAM,
    probability: {
      kind: 'number',
      label: 'Central band',
      unit: '',
      default: 0.99,
      min: 0.5,
      max: 0.9999,
      help: 'Probability with which a bin of Gaussian noise lies inside the shaded band.',
    },
    'false-ranges': {
      kind: 'number',
      label: 'False ranges',
      unit: '',
      default: 0.1,
      min: 0,
      exclusiveMin: true,
      max: 100,
      slider: 'log',
      help: 'Number of ranges that Gaussian noise may yield by chance in the whole spectrum, on average at most. It sets how far out a bin must lie to be marked and tabled.',
    },
    low: {
      kind: 'number',
      label: 'From',
      unit: 'Hz',
      default: null,
      min: 0,
      help: 'Lowest frequency that is judged. Left empty: the first bin that detrending and zero frequency do not change.',
    },
    high: {
      kind: 'number',
      label: 'To',
      unit: 'Hz',
      default: null,
      min: 0,
      exclusiveMin: true,
      help: 'Highest frequency that is judged. Left empty: just below half the sample rate.',
    },
    exclude: EXCLUDE_PARAM,
  },
  sources: [
    {
      text: 'Standard deviation over mean of the segment magnitudes, √((4−π)/π) = 0.52272 for Gaussian noise: common practice, no source',
      flag: 'common practice',
    },
    {
      text: 'Its scatter for n segments: delta method with Laguerre expansion for the overlap, skewness and kurtosis by simulation',
      flag: 'computed',
    },
    { text: 'Quantiles: Cornish & Fisher, Rev. Inst. Int. Stat. 5, 307 (1938)', flag: 'memory' },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const plan = planSegments(series, params.segment, params.overlap, params.exclude);
    const { size, step } = plan;
    const segments = plan.starts.length;
    const seconds = size / series.rate;
    if (segments < FEWEST)
      throw new UserError(
        'few-segments',
        `${counted(segments, 'segment')} of ${numberText(seconds)} s fit, and at least ${FEWEST} are needed to see how they fluctuate; set "segment" to ${numberText((seconds * segments) / (2 * FEWEST), 2)} s or less`,
      );
    const window = makeWindow(params.window, size);
    const law = ratioLaw(window, step, segments);
    if (law.segments < FEWEST)
      throw new UserError(
        'few-segments',
        `${counted(segments, 'segment')} that overlap by ${numberText(params.overlap)} are worth only ${numberText(law.segments, 3)} independent ones, and at least ${FEWEST} are needed; shorten "segment"`,
      );
    const bins = judgedBins(size, series.rate, params.low, params.high, params.window);
    const magnitudes = context.kernels.createMagnitudes({ segment: size, window, detrend: 'constant' });
    let all: Float64Array;
    try {
      await streamSegments(
        [{ series, offset: 0 }],
        plan.used,
        size,
        step,
        (fraction) => context.block(fraction),
        ([samples], at) => magnitudes.add(samples, at),
      );
      const { mean, variance } = magnitudes.result();
      all = mean.map((m, k) => (m > 0 ? Math.sqrt(variance[k]) / m : NaN));
    } finally {
      magnitudes.free();
    }
    const values = all.slice(...bins);
    const frequency = values.map((_, i) => ((bins[0] + i) * series.rate) / size);
    const side = (1 - params.probability) / 2;
    const rare = Math.min(side, params['false-ranges'] / (2 * values.length));
    const reach = Math.max(2, Math.ceil(2 * windowFigures(window).enbw));
    const facts: GaussianityFacts = {
      segments,
      law,
      probability: params.probability,
      falseRanges: params['false-ranges'],
      low: ratioQuantile(law, side, 'lower'),
      high: ratioQuantile(law, side, 'upper'),
      values,
      ranges: frequencyRanges(
        frequency,
        values,
        ratioQuantile(law, rare, 'lower'),
        ratioQuantile(law, rare, 'upper'),
        reach,
      ),
      neighbours: neighbourFactor(window),
    };
    const data: StatisticDetail = {
      kind: 'statistic',
      label: `Gaussianity of ${series.label}`,
      quantity: 'Standard deviation over mean of the magnitude',
      frequency,
      values,
      expected: law.mean,
      low: facts.low,
      high: facts.high,
      probability: params.probability,
      ranges: facts.ranges,
    };
    const [low, high] = [facts.ranges.filter((r) => r.side === 'low').length, facts.ranges.length];
    return {
      data,
      sentence:
        `Standard deviation over mean of the magnitudes of ${counted(segments, 'segment')} of ${numberText(seconds, 9)} s, ${params.window} window, overlap ${numberText(1 - step / size, 3)}, ` +
        `from ${numberText(spanLength(plan.used) / series.rate, 9)} s of ${series.label}; ${numberText(law.mean, 4)} expected of Gaussian noise: ` +
        `${counted(low, 'range')} too low (${RANGE_WORDS.low}), ${counted(high - low, 'range')} too high (${RANGE_WORDS.high}).` +
        repeated(series.notes),
      numbers: gaussianityNumbers(facts),
      warnings: gaussianityWarnings(facts),
      tables: [gaussianityTable(facts)],
    };
  },
  figures: (data, _params, _inputs, viewport) => [
    statisticFigure(data, viewport, {
      title: 'Gaussianity',
      scale: 'linear',
      atLeast: [0.3, 0.75],
      expectedName: 'expected of Gaussian noise:',
      words: RANGE_WORDS,
    }),
  ],
});

/** Bins `[from, to)` that are judged: away from zero and from the Nyquist frequency, where the transform is real. */
function judgedBins(
  size: number,
  rate: number,
  low: number | null,
  high: number | null,
  window: Parameters<typeof detrendedBins>[0],
): [number, number] {
  const margin = detrendedBins(window) + 1;
  const count = Math.floor(size / 2) + 1;
  const frequency = Float64Array.from({ length: count }, (_, k) => (k * rate) / size);
  const [from, to] = bandBins(frequency, [low ?? 0, high ?? rate / 2]);
  const bins: [number, number] = [Math.max(margin, from), Math.min(count - margin, to)];
  if (bins[1] - bins[0] < 1)
    throw new UserError(
      'empty-band',
      `no bin to judge from ${numberText(low ?? 0)} to ${numberText(high ?? rate / 2)} Hz; bins are every ${numberText(rate / size)} Hz from ${numberText((margin * rate) / size)} to ${numberText(((count - margin - 1) * rate) / size)} Hz`,
    );
  return bins;
}
