import { addSamples, formatGps, utcText } from '../data/gps-time';
import type { Quantity } from '../data/quantity';
import { counted, numberText, repeated, withUnit } from '../figures/number-text';
import { overviewFigures, type OverviewDetail } from '../figures/overview';
import { factsTable, spansTable } from '../look/overview-tables';
import { overviewWarnings } from '../look/overview-warnings';
import { gapsOf, scanSeries, type SeriesScan } from '../look/sample-scan';
import type { Series } from '../data/kinds';
import { defineStep } from './define';

export default defineStep({
  id: 'overview',
  title: 'Overview',
  version: 1,
  group: 'look',
  summary: 'Facts, gaps, bad and saturated samples, extremes and histogram of a series.',
  takes: [{ kind: 'series', count: 'one', help: 'the data to look at' }],
  gives: 'overview',
  params: {},
  sources: [
    {
      text: 'Median absolute deviation × 1.4826 as robust width: Hampel, J. Am. Stat. Assoc. 69, 383 (1974)',
      flag: 'memory',
    },
  ],
  async run(inputs, _params, context) {
    const series = inputs.one('series');
    const scan = await scanSeries(series, (fraction) => context.block(fraction));
    const data: OverviewDetail = {
      kind: 'overview',
      series,
      stats: scan.stats,
      envelope: scan.envelope,
      histogram: scan.histogram,
      robust: scan.robust,
      saturated: scan.saturated,
    };
    return {
      data,
      sentence: sentence(series, scan),
      numbers: numbers(series, scan),
      warnings: overviewWarnings(series, scan),
      tables: [factsTable(series), spansTable(series)],
    };
  },
  figures: (data, _params, _inputs, viewport) => overviewFigures(data, viewport),
});

function sentence(series: Series, { stats }: SeriesScan): string {
  const gaps = gapsOf(series).length;
  const end = addSamples(series.start, series.length, series.rate);
  return (
    `${numberText(series.length / series.rate, 9)} s of ${series.label} at ${withUnit(series.rate, 'Hz', 9)}, ` +
    `GPS ${formatGps(series.start)} to ${formatGps(end)} (from ${utcText(series.start)}), ` +
    `rms ${withUnit(stats.rms, series.unit)} about zero, ` +
    (gaps === 0 ? 'without gaps.' : `${counted(gaps, 'gap')}.`) +
    repeated(series.notes)
  );
}

function numbers(series: Series, scan: SeriesScan): Quantity[] {
  const { stats, robust } = scan;
  const unit = series.unit;
  const values: Quantity[] = [
    { id: 'rate', label: 'Sample rate', value: series.rate, unit: 'Hz' },
    {
      id: 'duration',
      label: 'Duration',
      value: series.length / series.rate,
      unit: 's',
      convention: 'samples divided by rate',
    },
    { id: 'samples', label: 'Samples', value: series.length, unit: '' },
    {
      id: 'unusable',
      label: 'Not usable',
      value: series.length - scan.used,
      unit: '',
      convention: 'samples not finite, missing, or spoilt by a filter edge',
    },
    {
      id: 'saturated',
      label: 'Saturated',
      value: stats.saturated,
      unit: '',
      convention: 'samples in cut-off runs of 8 or more at an extreme',
    },
  ];
  if (scan.used === 0) return values;
  return [
    ...values,
    { id: 'min', label: 'Smallest', value: stats.min, unit, convention: 'valid samples' },
    { id: 'max', label: 'Largest', value: stats.max, unit, convention: 'valid samples' },
    { id: 'mean', label: 'Mean', value: stats.mean, unit, convention: 'valid samples' },
    { id: 'rms', label: 'Rms', value: stats.rms, unit, convention: 'about zero' },
    {
      id: 'deviation',
      label: 'Standard deviation',
      value: scan.deviation,
      unit,
      convention: 'about the mean',
    },
    {
      id: 'robust-width',
      label: 'Robust width',
      value: robust.width,
      unit,
      convention: `about the median, from ${robust.from} samples`,
      explain: {
        formula: '1.4826 · median |x − median x|',
        source: 'Hampel, J. Am. Stat. Assoc. 69, 383 (1974), MEMORY',
      },
    },
  ];
}
