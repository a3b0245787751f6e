import { inherited } from '../condition/block-series';
import { GATE_PARAMS } from '../condition/gate-params';
import { gatedShare, gateNumbers, gateTable, gateWarnings, type GateFacts } from '../condition/gate-report';
import { searchedSeries, searchGates } from '../condition/gate-search';
import {
  applyGates,
  givenGates,
  joinGates,
  lostPower,
  touchedSpans,
  type Gate,
} from '../condition/gate-taper';
import { sweep } from '../condition/sweep';
import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import { intersectSpans, normaliseSpans, spanLength } from '../data/spans';
import { counted, numberText, repeated, withUnit } from '../figures/number-text';
import { seriesFigure } from '../figures/series';
import { RunningMoments } from '../look/running-moments';
import { defineStep } from './define';

export default defineStep({
  id: 'gate',
  title: 'Gate',
  version: 1,
  group: 'condition',
  summary: 'Brings loud transients smoothly to zero, at given times or where samples stand out.',
  takes: [{ kind: 'series', count: 'one', help: 'the data to gate' }],
  gives: 'series',
  params: GATE_PARAMS,
  sources: [
    { text: 'Half-cosine tapers, robust width from the median absolute deviation', flag: 'common practice' },
    { text: 'Window of the band filter: Harris, Proc. IEEE 66, 51 (1978)', flag: 'memory' },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    if (series.valid.length === 0)
      throw new UserError('no-data', `${series.label} has no valid sample: choose another span of the file`);
    const { threshold, low, high } = params;
    const taper = Math.round(params.taper * series.rate);
    const { inside, outside } = givenGates(series, params.spans, params['gps-spans']);
    const keep = context.memoryLimit / 4;
    const search =
      threshold === null
        ? undefined
        : await searchGates(
            searchedSeries(context.kernels, series, low, high, keep),
            threshold,
            Math.round(params.margin * series.rate),
            taper,
            (f) => context.block(f / 2, 'search'),
          );
    const gates = joinGates([...inside, ...(search?.gates ?? [])], taper);
    const data = gatedSeries(series, gates, taper);
    const moments = new RunningMoments();
    const done = search ? 0.5 : 0;
    await sweep(
      data,
      (f) => context.block(done + (1 - done) * f),
      (x) => moments.take(x, 0, x.length),
    );
    const facts: GateFacts = {
      from: series,
      to: data,
      gates,
      taper,
      touched: spanLength(touchedSpans(gates, taper, series.valid)),
      lost: lostPower(gates, taper, series.valid),
      outside,
      rms: moments.rms,
      threshold,
      search,
      band: low !== null || high !== null,
    };
    return {
      data,
      sentence: sentence(facts, low, high, params.margin),
      numbers: gateNumbers(facts),
      warnings: gateWarnings(facts),
      tables: [gateTable(facts)],
    };
  },
  figures: (data, _params, _inputs, viewport) => [seriesFigure(data, viewport, { title: 'Gated' })],
});

/** A series whose samples are multiplied as they are read; its valid spans are those of the original. */
function gatedSeries(series: Series, gates: readonly Gate[], taper: number): Series {
  const touched = touchedSpans(gates, taper, series.valid);
  const seconds = numberText(spanLength(touched) / series.rate);
  const notes = [
    ...(series.notes ?? []),
    ...(gates.length > 0 ? [`gated: ${counted(gates.length, 'span')}, ${seconds} s`] : []),
  ];
  return {
    ...inherited(series),
    kind: 'series',
    label: `gated ${series.label}`,
    unit: series.unit,
    rate: series.rate,
    length: series.length,
    valid: series.valid,
    ...(series.spoilt ? { spoilt: series.spoilt } : {}),
    gates: normaliseSpans(intersectSpans([...(series.gates ?? []), ...touched], series.valid)),
    ...(notes.length > 0 ? { notes } : {}),
    read(from, to, into = new Float64Array(to - from)) {
      series.read(from, to, into);
      applyGates(into.subarray(0, to - from), from, gates, taper);
      return into;
    },
  };
}

function sentence(f: GateFacts, low: number | null, high: number | null, margin: number): string {
  const { from, gates, taper, touched, search, threshold } = f;
  const { rate } = from;
  const where =
    low === null && high === null
      ? 'the samples as they are'
      : `a copy of the band ${numberText(low ?? 0)} to ${withUnit(high ?? rate / 2, 'Hz')}`;
  const tested =
    search && threshold !== null
      ? ` Tested: |x − median| over 1.4826 times the median absolute deviation in ${where}, above ${numberText(threshold)}; ` +
        `${counted(search.over, 'sample')} found, each with ${withUnit(margin, 's')} on either side.`
      : '';
  if (gates.length === 0)
    return `${from.label}, left as it is: there is nothing to gate.${tested}` + repeated(f.to.notes);
  return (
    `${from.label} brought to zero in ${counted(gates.length, 'span')}, with half-cosine tapers of ${withUnit(taper / rate, 's')} outside of them: ` +
    `${withUnit(touched / rate, 's')} in all, ${numberText(100 * gatedShare(f), 3)} % of the valid data, which stay valid.` +
    tested +
    repeated(f.to.notes)
  );
}
