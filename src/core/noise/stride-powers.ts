import type { Series } from '../data/kinds';
import type { Kernels } from '../kernels/kernels';
import { streamSegments } from './segment-stream';
import type { StridePlan } from './stride-plan';

/**
 * Mean |X|² per bin of every stride that has a value, in order, handed to `each` one after the other so that only one is
 * in memory; unscaled as the kernels give it. The array must not be kept.
 */
export async function stridePowers(
  series: Series,
  plan: StridePlan,
  kernels: Kernels,
  window: Float64Array,
  block: (fraction: number) => Promise<void>,
  each: (stride: number, power: Float64Array) => void,
): Promise<void> {
  const transform = kernels.createSegmentTransform({ segment: plan.size, window, detrend: 'constant' });
  const sum = kernels.array(transform.bins, 'f64');
  const zeros = new Float64Array(transform.bins);
  let current = -1;
  const finish = (): void => {
    if (current < 0) return;
    each(
      current,
      sum.slice().map((v) => v / plan.segments[current]),
    );
    sum.set(zeros);
  };
  try {
    await streamSegments(
      [{ series, offset: 0 }],
      plan.spans,
      plan.size,
      plan.step,
      block,
      ([samples], at, start) => {
        const stride = Math.floor(start / plan.stride);
        if (stride !== current) {
          finish();
          current = stride;
        }
        transform.load(samples, at);
        kernels.addPower(transform.spectrum, sum);
      },
    );
    finish();
  } finally {
    transform.free();
    sum.free();
  }
}
