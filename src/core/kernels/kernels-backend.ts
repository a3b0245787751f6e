import type { ComplexArray, KernelArray, Precision } from './complex-arrays';

/** Complex transform of one length. Plans are kept by the kernels and rebuilt when they were dropped; nothing to free. */
export interface FftPlan<P extends Precision = Precision> {
  readonly length: number;
  readonly precision: P;
  /** y[k] = Σ_j x[j] e^(−2πi jk/n). y may be x; otherwise they must not overlap. */
  forward(x: ComplexArray<P>, y: ComplexArray<P>): void;
  /** y[j] = Σ_k x[k] e^(+2πi jk/n), not divided by n. y may be x. */
  backward(x: ComplexArray<P>, y: ComplexArray<P>): void;
}

/** Transform of real samples of one length n; spectra have floor(n/2) + 1 bins. */
export interface RfftPlan<P extends Precision = Precision> {
  readonly length: number;
  readonly bins: number;
  readonly precision: P;
  /** One-sided spectrum of n real samples. x and y must not overlap. */
  forward(x: KernelArray<P>, y: ComplexArray<P>): void;
  /** n real samples, not divided by n; imaginary parts at zero and at the Nyquist frequency are ignored. */
  backward(x: ComplexArray<P>, y: KernelArray<P>): void;
}

/**
 * The operations that exist twice, in wasm and in plain TypeScript. Arrays must come from the same backend. Lengths
 * are those of the first argument unless said otherwise; longer further arguments are allowed, shorter ones throw.
 */
export interface Backend {
  readonly kind: 'wasm' | 'plain';
  /** An array of zeros; of anything when it need not be cleared. */
  array<P extends Precision>(length: number, precision: P, cleared?: boolean): KernelArray<P>;
  /** Real and imaginary part, zeros. */
  complex<P extends Precision>(length: number, precision: P): ComplexArray<P>;
  /** Bytes claimed from the system and bytes in use (plans included). */
  memory(): { reserved: number; used: number };
  /** Drops cached plans and scratch. */
  trim(): void;
  fftPlan<P extends Precision>(length: number, precision: P): FftPlan<P>;
  rfftPlan<P extends Precision>(length: number, precision: P): RfftPlan<P>;

  /** out = a b, element by element; out may be a or b. */
  multiply<P extends Precision>(a: ComplexArray<P>, b: ComplexArray<P>, out: ComplexArray<P>): void;
  /** out = a conj(b); out may be a or b. */
  multiplyConj<P extends Precision>(a: ComplexArray<P>, b: ComplexArray<P>, out: ComplexArray<P>): void;
  /** out = factor · weights · x, then zeros to the end of out. Weights are real; undefined means 1. */
  windowed<P extends Precision>(
    x: ComplexArray<P>,
    weights: KernelArray<P> | undefined,
    factor: number,
    out: ComplexArray<P>,
  ): void;
  /** Sum and maximum of |x|²; the squares themselves go to `out` when given. NaN never is the maximum. */
  energy<P extends Precision>(x: ComplexArray<P>, out?: KernelArray<P>): { sum: number; max: number };
  /** First index of the largest |x|², and that value. Index −1 when there is no number at all. */
  peak<P extends Precision>(x: ComplexArray<P>): { index: number; value: number };

  /** out = (x − mean) · weights, or x · weights when not centred. Returns Σx, not finite if any sample is not. */
  taper(
    x: KernelArray<'f64'>,
    weights: KernelArray<'f64'>,
    centred: boolean,
    out: KernelArray<'f64'>,
  ): number;
  /** out = |x|². */
  power(x: ComplexArray<'f64'>, out: KernelArray<'f64'>): void;
  /** out += |x|². */
  addPower(x: ComplexArray<'f64'>, out: KernelArray<'f64'>): void;
  /** out += a conj(b). */
  addCross(a: ComplexArray<'f64'>, b: ComplexArray<'f64'>, out: ComplexArray<'f64'>): void;
  /** Running mean of |x| and sum of squared deviations from it; `count` includes this x. */
  addMagnitude(
    x: ComplexArray<'f64'>,
    count: number,
    mean: KernelArray<'f64'>,
    spread: KernelArray<'f64'>,
  ): void;
  /**
   * Medians of the columns of `rows`: `count` rows of `stride` numbers, one median per element of `out`
   * (out.length <= stride). NaN in a column may give NaN or be ordered as the largest number.
   */
  medians(rows: KernelArray<'f64'>, stride: number, count: number, out: KernelArray<'f64'>): void;
  /**
   * Second-order sections in place over samples from..from+count of x, backwards in time if asked. Coefficients per
   * section b0 b1 b2 a1 a2 (a0 = 1), states z0 z1 per section, carried on.
   */
  cascade(
    x: KernelArray<'f64'>,
    count: number,
    backwards: boolean,
    coefficients: KernelArray<'f64'>,
    states: KernelArray<'f64'>,
  ): void;
}

/** Throws unless every array is at least `need` long. */
export function checkLengths(what: string, need: number, ...arrays: { length: number }[]): void {
  for (const a of arrays) {
    if (a.length < need) throw new RangeError(`${what}: needs ${need} numbers, the array has ${a.length}`);
  }
}

const onlySmallFactors = (n: number): boolean => {
  let rest = n;
  for (const p of [2, 3, 5]) while (rest % p === 0) rest /= p;
  return rest === 1;
};

/** Throws unless the kernels can hold a transform of `length` points in their 4 GiB. */
export function checkTransformLength(length: number): void {
  if (!Number.isInteger(length) || length < 1 || length > 2 ** 27) {
    throw new RangeError(`a transform needs a whole number of samples from 1 to 2^27, not ${length}`);
  }
  if (length > 2 ** 24 && (length % 2 === 1 || !onlySmallFactors(length))) {
    throw new RangeError(
      `a transform of ${length} samples is too long: beyond 2^24 the length must be even and without prime factors ` +
        'above 5; use a slightly shorter span',
    );
  }
}

/** Throws unless `length` can be the length of an array. */
export function checkArrayLength(length: number): void {
  if (!Number.isInteger(length) || length < 0) throw new RangeError(`an array cannot have ${length} numbers`);
}
