import type { Kernels } from '../kernels/kernels';
import { complementSpans, intersectSpans, type Span } from '../data/spans';
import type { Series } from '../data/kinds';
import { blockSeries, type SeriesFacts } from './block-series';

/** Points of a transform, unless the filter needs more or the data are shorter. */
const TRANSFORM = 2 ** 18;

const nextPowerOfTwo = (n: number): number => 2 ** Math.ceil(Math.log2(Math.max(2, n)));

/** The part of valid spans in which a filter that reaches `reach` samples to either side rests on valid samples alone. */
export const innerSpans = (spans: readonly Span[], reach: number): Span[] =>
  spans.map(({ from, to }) => ({ from: from + reach, to: to - reach })).filter(({ from, to }) => to > from);

/** Valid, spoilt and gated spans of a series filtered with a reach of so many samples to either side. */
export function filteredSpans(
  series: Series,
  reach: number,
): Pick<Series, 'valid'> & Partial<Pick<Series, 'spoilt' | 'gates'>> {
  const valid = innerSpans(series.valid, reach);
  const spoilt = intersectSpans(
    [...series.valid, ...(series.spoilt ?? [])],
    complementSpans(valid, series.length),
  );
  const gates =
    series.gates &&
    intersectSpans(
      series.gates.map(({ from, to }) => ({ from: from - reach, to: to + reach })),
      valid,
    );
  return { valid, spoilt, ...(gates ? { gates } : {}) };
}

/**
 * A series filtered without delay by a filter symmetric in time: y(n) = Σ h_|k| x(n + k), |k| < taps.length. Exact in float64,
 * by overlap-save: no fade is needed, and no value rests on another valid span or on a block's edge.
 *
 * @param facts of the series made; `valid` from `innerSpans` with the filter's reach
 * @param keep bytes of results kept
 */
export function filteredSeries(
  kernels: Kernels,
  series: Series,
  taps: Float64Array,
  facts: SeriesFacts,
  keep: number,
): Series {
  const reach = taps.length - 1;
  const size = Math.max(
    nextPowerOfTwo(8 * reach),
    Math.min(TRANSFORM, nextPowerOfTwo(series.length + 2 * reach)),
  );
  const response = responseOf(kernels, taps, size);
  const block = size - 2 * reach;
  return blockSeries(
    facts,
    (from, to, out) => {
      const plan = kernels.rfftPlan(size, 'f64');
      const input = new Float64Array(size);
      const samples = kernels.array(size, 'f64');
      const spectrum = kernels.complex(plan.bins, 'f64');
      try {
        for (const run of intersectSpans(facts.valid, [{ from, to }])) {
          // Read into an array of our own: reading a series that computes itself may move the kernels' memory.
          const n = run.to - run.from + 2 * reach;
          series.read(run.from - reach, run.to + reach, input.subarray(0, n));
          input.fill(0, n);
          samples.set(input);
          plan.forward(samples, spectrum);
          const re = spectrum.re.view();
          const im = spectrum.im.view();
          for (let k = 0; k < response.length; k++) {
            re[k] *= response[k];
            im[k] *= response[k];
          }
          plan.backward(spectrum, samples);
          out.set(samples.view().subarray(reach, reach + run.to - run.from), run.from - from);
        }
      } finally {
        samples.free();
        spectrum.free();
      }
    },
    keep,
    block,
  );
}

/** Response of a symmetric filter on the bins of a transform, real, divided by its size. */
function responseOf(kernels: Kernels, taps: Float64Array, size: number): Float64Array {
  const circle = new Float64Array(size);
  taps.forEach((h, k) => {
    circle[k] = h / size;
    if (k > 0) circle[size - k] = h / size;
  });
  return kernels.rfft(circle).re;
}
