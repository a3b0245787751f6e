import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import { spanLength } from '../data/spans';
import { counted, numberText, repeated, withUnit } from '../figures/number-text';
import { statisticFigure, type StatisticDetail } from '../figures/statistic';
import { makeWindow } from '../kernels/windows';
import { welchVarianceFactor } from '../kernels/window-figures-averages';
import { windowFigures } from '../kernels/window-figures';
import { coherenceEstimate } from '../noise/coherence-estimate';
import { coherenceLevel } from '../noise/coherence-level';
import {
  coherenceNumbers,
  coherenceTable,
  coherenceWarnings,
  type CoherenceFacts,
} from '../noise/coherence-report';
import { commonSpan } from '../noise/common-span';
import { detrendedBins } from '../noise/detrended-bins';
import { frequencyRanges } from '../noise/frequency-ranges';
import { EXCLUDE_PARAM, OVERLAP_PARAM, WINDOW_PARAM } from '../noise/segment-params';
import { planSegments } from '../noise/segments';
import { defineStep } from './define';

export default defineStep({
  id: 'coherence',
  title: 'Coherence',
  version: 1,
  group: 'noise',
  summary: 'What two channels have in common at each frequency, with the level that chance reaches.',
  takes: [
    { kind: 'series', count: 'one', help: 'the first channel' },
    { kind: 'series', count: 'one', help: 'the second channel, at the same rate and over the same time' },
  ],
  gives: 'statistic',
  params: {
    segment: {
      kind: 'number',
      label: 'Segment',
      unit: 's',
      default: 4,
      min: 0,
      exclusiveMin: true,
      slider: 'log',
      help: 'Length of the pieces that are averaged. Bins are 1/segment apart. Without anything in common the coherence is still one over the number of segments, so shorter segments show weaker coherence and longer ones narrower lines.',
    },
    overlap: OVERLAP_PARAM,
    window: WINDOW_PARAM,
    detrend: {
      kind: 'choice',
      label: 'Detrend',
      choices: ['constant', 'none'],
      default: 'constant',
      help: 'Takes the mean off each segment before the window. The lowest bins this changes are not judged.',
    },
    'false-probability': {
      kind: 'number',
      label: 'False probability',
      unit: '',
      default: 0.01,
      min: 0,
      max: 0.5,
      exclusiveMin: true,
      slider: 'log',
      help: 'Probability with which chance alone passes the level: that of one bin (shaded), and that of all bins together (marked ranges, tabled).',
    },
    exclude: {
      ...EXCLUDE_PARAM,
      help: 'Spans that must not enter, as pairs of seconds after the start of the time the two have in common: a transient that both saw makes everything coherent.',
    },
  },
  sources: [
    {
      text: 'Significance without common signal: Carter, Knapp, Nuttall, IEEE Trans. Audio Electroacoust. AU-21, 337 (1973)',
      flag: 'memory',
    },
    {
      text: 'Averaged periodograms, effective averages with overlap: Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967)',
      flag: 'memory',
    },
    { text: 'Interval of an estimate: Enochson & Goodman, report AFFDL-TR-65-57 (1965)', flag: 'memory' },
  ],
  async run(inputs, params, context) {
    const pair = [inputs.one('series', 0), inputs.one('series', 1)] as const;
    const common = commonSpan(...pair);
    const { start, length, valid, rate } = common;
    const label = `${pair[0].label} and ${pair[1].label}`;
    const plan = planSegments(
      { ...pair[0], label: `the time common to ${label}`, start, length, valid },
      params.segment,
      params.overlap,
      params.exclude,
    );
    const { size, step } = plan;
    const segments = plan.starts.length;
    if (segments < 2)
      throw new UserError(
        'one-segment',
        `only one segment of ${numberText(size / rate)} s fits, and the coherence of one segment is 1 everywhere; set "segment" to ${numberText(size / rate / 8)} s or less`,
      );
    const window = makeWindow(params.window, size);
    const averages = 1 / welchVarianceFactor(window, step, segments);
    if (averages < 1.5)
      throw new UserError(
        'one-segment',
        `${counted(segments, 'segment')} of ${numberText(size / rate)} s that overlap so far are worth only ${numberText(averages, 3)} independent ones; shorten "segment" or lower "overlap"`,
      );
    const { coherence, phase } = await coherenceEstimate(
      pair,
      common,
      plan,
      context.kernels,
      window,
      params.detrend,
      (fraction) => context.block(fraction),
    );
    const df = rate / size;
    const frequency = Float64Array.from(coherence, (_, k) => k * df);
    // At zero and at the Nyquist frequency the transform is real, which follows another law.
    const lowest = Math.max(1, params.detrend === 'constant' ? detrendedBins(params.window) : 1);
    const judged = [lowest, size % 2 === 0 ? coherence.length - 1 : coherence.length] as const;
    const p = params['false-probability'];
    const level = coherenceLevel(p, averages);
    const searchLevel = coherenceLevel(p / Math.max(1, judged[1] - judged[0]), averages);
    const inside = coherence.map((v, k) => (k >= judged[0] && k < judged[1] ? v : NaN));
    const reach = Math.max(2, Math.ceil(2 * windowFigures(window).enbw));
    const facts: CoherenceFacts = {
      names: [pair[0].label, pair[1].label],
      segments,
      averages,
      frequency,
      coherence,
      phase,
      judged,
      falseProbability: p,
      level,
      searchLevel,
      ranges: frequencyRanges(frequency, inside, -1, searchLevel, reach),
      fraction: common.fraction,
    };
    const data: StatisticDetail = {
      kind: 'statistic',
      label: `coherence of ${label}`,
      quantity: 'Magnitude-squared coherence',
      frequency,
      values: coherence,
      expected: 1 / averages,
      low: 0,
      high: level,
      probability: 1 - p,
      ranges: facts.ranges,
    };
    return {
      data,
      sentence:
        `Magnitude-squared coherence of ${label} over ${numberText(spanLength(plan.used) / rate, 9)} s: ` +
        `${counted(segments, 'segment')} of ${numberText(size / rate, 9)} s valid in both, ${params.window} window, overlap ${numberText(1 - step / size, 3)}, bins every ${withUnit(df, 'Hz')}; ` +
        `${counted(facts.ranges.length, 'range')} above ${numberText(searchLevel, 3)}, the level of all bins at ${numberText(p)}.` +
        [...new Set(pair.flatMap((s: Series) => s.notes ?? []))].map((n) => repeated([n])).join(''),
      numbers: coherenceNumbers(facts),
      warnings: coherenceWarnings(facts),
      tables: [coherenceTable(facts)],
    };
  },
  figures: (data, _params, _inputs, viewport) => [
    statisticFigure(data, viewport, {
      title: 'Coherence',
      scale: 'linear',
      atLeast: [0, 1],
      expectedName: 'mean without anything in common, 1/n:',
      words: { low: 'low', high: 'coherent' },
    }),
  ],
});
