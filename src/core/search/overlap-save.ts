import type { Span } from '../data/spans';
import type { Series } from '../data/kinds';
import { normaliseSpans } from '../data/spans';
import type { ComplexArray, KernelArray } from '../kernels/complex-arrays';
import type { Kernels } from '../kernels/kernels';

/** Samples of a block, and how many a value rests on before and after itself; `fade` more at each end are faded out. */
export interface BlockShape {
  readonly size: number;
  readonly lead: number;
  readonly tail: number;
  readonly fade: number;
}

/** One block: samples `[from, to)` are read, values `[first, last)` are kept. */
export interface Block {
  readonly from: number;
  readonly to: number;
  readonly first: number;
  readonly last: number;
}

/** Lays overlapping blocks into valid spans so that every value that rests on valid samples alone is kept once. */
export function planBlocks(spans: readonly Span[], shape: BlockShape): Block[] {
  const { size, lead, tail, fade } = shape;
  const before = lead + fade;
  const after = tail + fade;
  const step = size - before - after;
  if (step < 1) throw new RangeError(`blocks of ${size} samples keep nothing of ${before} + ${after}`);
  const out: Block[] = [];
  for (const span of normaliseSpans(spans)) {
    const end = span.to - after;
    for (let first = span.from + before; first < end; first += step) {
      const from = first - before;
      const to = Math.min(span.to, from + size);
      out.push({ from, to, first, last: to - after });
    }
  }
  return out;
}

/** What values the blocks keep, as spans. */
export const keptSpans = (blocks: readonly Block[]): Span[] =>
  normaliseSpans(blocks.map(({ first, last }) => ({ from: first, to: last })));

/** Half a cosine over the first and the last `fade` samples, so that the ends of a block make no broadband click. */
export function fadeEnds(x: Float64Array, fade: number): void {
  const n = x.length;
  const m = Math.min(fade, n >> 1);
  for (let i = 0; i < m; i++) {
    const w = 0.5 - 0.5 * Math.cos((Math.PI * (i + 0.5)) / m);
    x[i] *= w;
    x[n - 1 - i] *= w;
  }
}

/** Transforms blocks of a series; free it when done. */
export interface BlockTransform {
  /** One-sided spectrum of samples `[from, to)`, faded, zeros after; valid until the next call. */
  load(from: number, to: number): ComplexArray<'f64'>;
  free(): void;
}

export function createBlockTransform(
  kernels: Kernels,
  series: Series,
  size: number,
  fade: number,
): BlockTransform {
  const plan = kernels.rfftPlan(size, 'f64');
  const input: KernelArray<'f64'> = kernels.array(size, 'f64');
  const spectrum = kernels.complex(plan.bins, 'f64');
  const samples = new Float64Array(size);
  return {
    load(from, to) {
      const part = samples.subarray(0, to - from);
      series.read(from, to, part);
      fadeEnds(part, fade);
      samples.fill(0, to - from);
      input.set(samples);
      plan.forward(input, spectrum);
      return spectrum;
    },
    free() {
      input.free();
      spectrum.free();
    },
  };
}

/**
 * Correlates a series with a filter, block by block (overlap-save): values(n) = Σ_k X_k conj(Q_k) e^(2πi kn/size), X the
 * transform of the block and Q one-sided, so the values are complex. Values not kept by any block stay as they are in `out`.
 *
 * @param filter Q on bins 0 … size / 2, all factors in it
 * @param out real and imaginary part, one value per sample of the series
 */
export async function correlate(
  kernels: Kernels,
  series: Series,
  filter: { readonly re: Float64Array; readonly im: Float64Array },
  shape: BlockShape,
  blocks: readonly Block[],
  out: { readonly re: Float64Array; readonly im: Float64Array },
  report: (fraction: number) => Promise<void>,
): Promise<void> {
  const { size, fade } = shape;
  const transform = createBlockTransform(kernels, series, size, fade);
  const q = kernels.complex(filter.re.length, 'f64');
  const product = kernels.complex(size, 'f64');
  const values = kernels.complex(size, 'f64');
  try {
    q.re.set(filter.re);
    q.im.set(filter.im);
    const plan = kernels.fftPlan(size, 'f64');
    for (const [i, block] of blocks.entries()) {
      await report(i / blocks.length);
      kernels.multiplyConj(transform.load(block.from, block.to), q, product);
      plan.backward(product, values);
      const a = block.first - block.from;
      const b = block.last - block.from;
      out.re.set(values.re.view().subarray(a, b), block.first);
      out.im.set(values.im.view().subarray(a, b), block.first);
    }
  } finally {
    for (const array of [transform, q, product, values]) array.free();
  }
}
