import { readFileSync } from 'node:fs';
import { buildWasm } from '../../scripts/build-wasm.mjs';
import { createKernels, type Kernels } from '../../src/core/kernels/kernels';
import { compileKernels, type WasmModule } from '../../src/core/kernels/wasm-module';

/** Milliseconds a hook may take that has to compile the module first. */
export const BUILD_TIME = 180_000;

/** The compiled module, built from src/wasm first if it is out of date. */
export async function loadModule(): Promise<WasmModule> {
  const module = compileKernels(readFileSync(await buildWasm()));
  if (!module) throw new Error('this Node cannot run the SIMD module');
  return module;
}

/** Both sets of kernels: WebAssembly and plain. */
export async function loadKernels(): Promise<{ wasm: Kernels; plain: Kernels }> {
  return { wasm: createKernels(await loadModule()), plain: createKernels(undefined) };
}

/** Lehmer generator (Park and Miller, CACM 31, 1192, 1988) in 24 bits, as in test/oracle/fft.py: −0.5 .. 0.5. */
export function samples(n: number, seed: number): Float64Array {
  let s = seed;
  return Float64Array.from({ length: n }, () => {
    s = (s * 16807) % 2147483647;
    return Math.floor(s / 128) / 2 ** 24 - 0.5;
  });
}

/** Largest |a − b| over all elements; NaN when the lengths differ. */
export function largestError(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let largest = a.length === b.length ? 0 : NaN;
  for (let k = 0; k < b.length; k++) {
    const d = Math.abs(a[k] - b[k]);
    if (!(d <= largest)) largest = d;
  }
  return largest;
}

/** Root of Σ(a−b)² / Σb². */
export function relativeError(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let difference = 0;
  let size = 0;
  for (let k = 0; k < b.length; k++) {
    difference += (a[k] - b[k]) ** 2;
    size += b[k] ** 2;
  }
  return a.length === b.length ? Math.sqrt(difference / (size || 1)) : NaN;
}

export function hann(n: number): Float64Array {
  return Float64Array.from({ length: n }, (_, i) => 0.5 - 0.5 * Math.cos((2 * Math.PI * i) / n));
}
