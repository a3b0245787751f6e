import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import { complementSpans, intersectSpans, normaliseSpans, type Span } from '../data/spans';
import { numberText } from '../figures/number-text';
import { resampledLength, resampleInto, type ResamplePlan } from '../kernels/resample-poly';
import { ratioOfRates, type Ratio } from '../kernels/resample-poly-ratio';
import { blockSeries, inherited } from './block-series';
import { nearestRates } from './resample-nearest';

/** The ratio that leads from one rate to another. @throws UserError naming the nearest rates that can be had */
export function wantedRatio(from: number, to: number): Ratio {
  try {
    return ratioOfRates(from, to);
  } catch (e) {
    if (!(e instanceof UserError) || e.code !== 'resample-ratio') throw e;
    const near = nearestRates(from, to).map((r) => `${r} Hz`);
    throw new UserError(
      'resample-ratio',
      `from ${numberText(from, 12)} Hz to ${numberText(to, 12)} Hz there is no ratio of whole numbers up to 65536; set "rate" to the nearest that has a simple one: ${near.join(' or ')}`,
    );
  }
}

/**
 * A series at rate · up/down. Output m is taken at the time of input m · down/up, so the start stays; each valid span is
 * filtered on its own, and only outputs whose whole filter lies inside it are valid.
 */
export function resampledSeries(
  series: Series,
  rate: number,
  plan: ResamplePlan,
  label: string,
  keep: number,
): Series {
  const { up, down, half } = plan;
  const length = resampledLength(plan, series.length);
  const inner: { readonly input: Span; readonly output: Span }[] = [];
  for (const input of normaliseSpans(series.valid)) {
    const from = Math.ceil((input.from * up + half) / down);
    const to = Math.floor(((input.to - 1) * up - half) / down) + 1;
    if (to > from) inner.push({ input, output: { from, to } });
  }
  const valid = inner.map((s) => s.output);
  // An output is spoilt when its time lies in a span that has samples but its filter does not fit in.
  const touched = onNewGrid([...series.valid, ...(series.spoilt ?? [])], plan, length);
  const spoilt = intersectSpans(touched, complementSpans(valid, length));
  const gates = series.gates && intersectSpans(onNewGrid(series.gates, plan, length, half), valid);
  return blockSeries(
    {
      ...inherited(series),
      label,
      unit: series.unit,
      rate,
      length,
      valid,
      spoilt,
      ...(gates ? { gates } : {}),
    },
    (from, to, out) => {
      for (const { input, output } of inner) {
        const a = Math.max(from, output.from);
        const b = Math.min(to, output.to);
        if (b <= a) continue;
        const first = Math.max(input.from, Math.ceil((a * down - half) / up));
        const last = Math.min(input.to, Math.floor(((b - 1) * down + half) / up) + 1);
        resampleInto(plan, series.read(first, last), first, a, out.subarray(a - from, b - from));
      }
    },
    keep,
  );
}

/** Outputs within `reach` (on the fine grid of both rates) of samples of spans. */
function onNewGrid(spans: readonly Span[], { up, down }: Ratio, length: number, reach = 0): Span[] {
  return normaliseSpans(
    spans.map((s) => ({
      from: Math.max(0, Math.ceil((s.from * up - reach) / down)),
      to: Math.min(length, Math.ceil((s.to * up + reach) / down)),
    })),
  );
}
