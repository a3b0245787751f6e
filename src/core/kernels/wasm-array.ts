import { checkPart, type KernelArray, type Precision, type Samples } from './complex-arrays';
import type { Heap } from './heap';
import type { WasmMemory } from './wasm-module';

/** A kernel array in WebAssembly memory. Views are made afresh, since growth of the memory detaches old ones. */
export class WasmArray<P extends Precision = Precision> implements KernelArray<P> {
  readonly precision: P;
  readonly length: number;
  private readonly memory: WasmMemory;
  private readonly heap: Heap | undefined;
  private at: number;

  /** `heap` is given for the array that owns its memory, not for parts. */
  constructor(memory: WasmMemory, heap: Heap | undefined, precision: P, length: number, at: number) {
    this.memory = memory;
    this.heap = heap;
    this.precision = precision;
    this.length = length;
    this.at = at;
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
    return new WasmArray(this.memory, undefined, this.precision, to - from, this.address + from * size);
  }

  fill(value: number): void {
    this.view().fill(value);
  }

  free(): void {
    if (!this.heap) throw new Error('a part of a kernel array cannot be freed: free the whole');
    this.heap.release(this.address);
    this.at = 0;
  }
}

/** Address of an array made by this backend; throws for arrays of the plain one. */
export function address(array: KernelArray): number {
  if (array instanceof WasmArray) return array.address;
  throw new TypeError('this array belongs to other kernels: arrays cannot be shared between them');
}
