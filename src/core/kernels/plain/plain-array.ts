import {
  checkPart,
  complexArray,
  type ComplexArray,
  type KernelArray,
  type Precision,
  type Samples,
} from '../complex-arrays';
import { checkArrayLength } from '../kernels-backend';

/** A kernel array on an ordinary typed array. */
export class PlainArray<P extends Precision = Precision> implements KernelArray<P> {
  readonly precision: P;
  private data: Samples<P> | undefined;
  private readonly owner: boolean;

  constructor(precision: P, data: Samples<P>, owner: boolean) {
    this.precision = precision;
    this.data = data;
    this.owner = owner;
  }

  get length(): number {
    return this.view().length;
  }

  view(): Samples<P> {
    if (!this.data) throw new Error('this kernel array has been freed');
    return this.data;
  }

  set(source: ArrayLike<number>, at = 0): void {
    checkPart(at, at + source.length, this.length);
    this.view().set(source, at);
  }

  slice(from = 0, to = this.length): Samples<P> {
    checkPart(from, to, this.length);
    return this.view().slice(from, to) as Samples<P>;
  }

  sub(from: number, to: number): PlainArray<P> {
    checkPart(from, to, this.length);
    return new PlainArray(this.precision, this.view().subarray(from, to) as Samples<P>, false);
  }

  fill(value: number): void {
    this.view().fill(value);
  }

  free(): void {
    if (!this.owner) throw new Error('a part of a kernel array cannot be freed: free the whole');
    this.view();
    this.data = undefined;
  }
}

/** Array of `length` zeros. */
export function plainArray<P extends Precision>(length: number, precision: P): PlainArray<P> {
  checkArrayLength(length);
  const data = precision === 'f64' ? new Float64Array(length) : new Float32Array(length);
  return new PlainArray(precision, data as Samples<P>, true);
}

/** Real and imaginary part, zeros. */
export function plainComplex<P extends Precision>(length: number, precision: P): ComplexArray<P> {
  const [re, im] = [plainArray(length, precision), plainArray(length, precision)];
  return complexArray(re, im, () => {
    re.free();
    im.free();
  });
}
