/** Element type of kernel arrays. */
export type Precision = 'f64' | 'f32';

/** Typed array of an element type. */
export type Samples<P extends Precision> = P extends 'f64' ? Float64Array : Float32Array;

/**
 * An array in the kernels' own memory, for work that would suffer from copying. Ordinary typed arrays are copied in
 * with `set` and out with `slice`. Free it when done; parts made by `sub` are freed with the whole.
 */
export interface KernelArray<P extends Precision = Precision> {
  readonly precision: P;
  readonly length: number;
  /** The numbers themselves, without a copy. Do not keep it: the next kernel array allocated may detach it. */
  view(): Samples<P>;
  /** Copies `source` (converted to the element type) to elements from `at` on. */
  set(source: ArrayLike<number>, at?: number): void;
  /** A copy of elements from..to. */
  slice(from?: number, to?: number): Samples<P>;
  /** Elements from..to in the same memory. */
  sub(from: number, to: number): KernelArray<P>;
  fill(value: number): void;
  free(): void;
}

/** Complex numbers as two kernel arrays of equal length. */
export interface ComplexArray<P extends Precision = Precision> {
  readonly precision: P;
  readonly length: number;
  readonly re: KernelArray<P>;
  readonly im: KernelArray<P>;
  sub(from: number, to: number): ComplexArray<P>;
  free(): void;
}

/** Real and imaginary parts in two ordinary arrays. */
export interface Split<A = Float64Array> {
  re: A;
  im: A;
}

const refuse = (): never => {
  throw new Error('a part of a kernel array cannot be freed: free the whole');
};

/** Pairs two kernel arrays; `free` gives both back. */
export function complexArray<P extends Precision>(
  re: KernelArray<P>,
  im: KernelArray<P>,
  free: () => void,
): ComplexArray<P> {
  if (re.length !== im.length)
    throw new RangeError(`real part has ${re.length} numbers, imaginary part ${im.length}`);
  return {
    precision: re.precision,
    length: re.length,
    re,
    im,
    sub: (from, to) => complexArray(re.sub(from, to), im.sub(from, to), refuse),
    free,
  };
}

/** Checks 0 <= from <= to <= length. */
export function checkPart(from: number, to: number, length: number): void {
  if (!(Number.isInteger(from) && Number.isInteger(to) && from >= 0 && from <= to && to <= length)) {
    throw new RangeError(`part ${from}..${to} is not inside an array of ${length} numbers`);
  }
}
