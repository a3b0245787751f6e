import { checkPart, type KernelArray, type Precision, type Samples } from './complex-arrays';
import type { WasmMemory } from './wasm-module';

/** A kernel array in WebAssembly memory. Views are made afresh, since growth of the memory detaches old ones. */
export class WasmArray<P extends Precision = Precision> implements KernelArray<P> {
  readonly precision: P;
  readonly length: number;
  private readonly memory: WasmMemory;
  private readonly release: (() => void) | undefined;
  private at: number;

  /** `release` is given for the array that owns its memory, not for parts. */
  constructor(
    memory: WasmMemory,
    precision: P,
    length: number,
    at: number,
    release: (() => void) | undefined,
  ) {
    this.memory = memory;
    this.precision = precision;
    this.length = length;
    this.at = at;
    this.release = release;
  }

  /** Byte address. Throws after `free`. */
  get address(): number {
    if (this.at === 0) throw new Error('this kernel array has been freed');
    return this.at;
  }

  view(): Samples<P> {
    const { buffer } = this.memory;
    const view =
      this.precision === 'f64'
        ? new Float64Array(buffer, this.address, this.length)
        : new Float32Array(buffer, this.address, this.length);
    return view as Samples<P>;
  }

  set(source: ArrayLike<number>, at = 0): void {
    checkPart(at, at + source.length, this.length);
    this.view().set(source, at);
  }

  slice(from = 0, to = this.length): Samples<P> {
    checkPart(from, to, this.length);
    return this.view().slice(from, to) as Samples<P>;
  }

  sub(from: number, to: number): WasmArray<P> {
    checkPart(from, to, this.length);
    const size = this.precision === 'f64' ? 8 : 4;
    return new WasmArray(this.memory, this.precision, to - from, this.address + from * size, undefined);
  }

  fill(value: number): void {
    this.view().fill(value);
  }

  free(): void {
    if (!this.release) throw new Error('a part of a kernel array cannot be freed: free the whole');
    this.forget();
    this.release();
  }

  /** Makes every further use an error: the memory is no longer this array's. */
  forget(): void {
    if (this.at === 0) throw new Error('this kernel array has been freed');
    this.at = 0;
  }
}

/** Address of an array made by this backend; throws for arrays of the plain one. */
export function address(array: KernelArray): number {
  if (array instanceof WasmArray) return array.address;
  throw new TypeError('this array belongs to other kernels: arrays cannot be shared between them');
}
