import { complexArray, type ComplexArray, type Precision } from './complex-arrays';
import { Heap } from './heap';
import { checkArrayLength, checkLengths, type Backend } from './kernels-backend';
import { address, WasmArray } from './wasm-array';
import { wasmFftPlan, wasmRfftPlan } from './wasm-fft';
import { instantiate, type WasmModule } from './wasm-module';
import { WasmPlans } from './wasm-plans';

const SIZE = { f64: 8, f32: 4 };
const PAGE = 4096;

/**
 * Where the imaginary part lies after the real part, and bytes of both. Streams that start at the same offset in a page
 * compete for the same cache sets (a transform of 2^17 points took 1.25 times as long), so parts of a page or more are
 * half a page apart, and the next array starts a quarter further on.
 */
function complexLayout(bytes: number): { apart: number; total: number } {
  const small = bytes < PAGE;
  const apart = small ? Math.ceil(bytes / 64) * 64 + 64 : Math.ceil(bytes / PAGE) * PAGE + PAGE / 2 + 64;
  return { apart, total: small ? apart + bytes : Math.ceil((apart + bytes) / PAGE) * PAGE + PAGE / 4 + 64 };
}

/** The operations on a WebAssembly instance of its own. */
export function wasmBackend(module: WasmModule): Backend {
  const instance = instantiate(module);
  const { memory, common, typed } = instance;
  const heap = new Heap(memory, common.heapBase());
  const plans = new WasmPlans(instance, heap);

  const array = <P extends Precision>(length: number, precision: P, cleared = true): WasmArray<P> => {
    checkArrayLength(length);
    const at = heap.alloc(length * SIZE[precision]);
    const made = new WasmArray(memory, precision, length, at, () => heap.release(at));
    if (cleared) made.fill(0);
    return made;
  };
  const complex = <P extends Precision>(length: number, precision: P): ComplexArray<P> => {
    checkArrayLength(length);
    const { apart, total } = complexLayout(length * SIZE[precision]);
    const at = heap.alloc(total);
    const part = (from: number): WasmArray<P> => new WasmArray(memory, precision, length, from, undefined);
    const [re, im] = [part(at), part(at + apart)];
    re.fill(0);
    im.fill(0);
    return complexArray(re, im, () => {
      heap.release(at);
      re.forget();
      im.forget();
    });
  };

  return {
    kind: 'wasm',
    array,
    complex,
    memory: () => ({ reserved: heap.reserved, used: heap.used }),
    trim: () => plans.clear(),
    fftPlan: (length, precision) => wasmFftPlan(instance, plans, length, precision),
    rfftPlan: (length, precision) => wasmRfftPlan(instance, plans, length, precision),

    multiply: (a, b, out) => {
      checkLengths('multiply', a.length, b, out);
      typed[a.precision].multiply(
        a.length,
        address(a.re),
        address(a.im),
        address(b.re),
        address(b.im),
        address(out.re),
        address(out.im),
      );
    },
    multiplyConj: (a, b, out) => {
      checkLengths('multiplyConj', a.length, b, out);
      typed[a.precision].multiplyConj(
        a.length,
        address(a.re),
        address(a.im),
        address(b.re),
        address(b.im),
        address(out.re),
        address(out.im),
      );
    },
    windowed: (x, weights, factor, out) => {
      checkLengths('windowed', x.length, out, ...(weights ? [weights] : []));
      typed[x.precision].windowed(
        x.length,
        out.length,
        address(x.re),
        address(x.im),
        weights ? address(weights) : 0,
        factor,
        address(out.re),
        address(out.im),
      );
    },
    energy: (x, out) => {
      if (out) checkLengths('energy', x.length, out);
      const to = out ? address(out) : 0;
      const sum = typed[x.precision].energy(x.length, address(x.re), address(x.im), to);
      return { sum, max: common.largest() };
    },
    peak: (x) => {
      const index = typed[x.precision].peak(x.length, address(x.re), address(x.im));
      return { index, value: common.largest() };
    },

    taper: (x, weights, centred, out) => {
      checkLengths('taper', x.length, weights, out);
      return common.taper(x.length, address(x), address(weights), centred ? 1 : 0, address(out));
    },
    power: (x, out) => {
      checkLengths('power', x.length, out);
      common.power(x.length, address(x.re), address(x.im), address(out));
    },
    addPower: (x, out) => {
      checkLengths('addPower', x.length, out);
      common.addPower(x.length, address(x.re), address(x.im), address(out));
    },
    addCross: (a, b, out) => {
      checkLengths('addCross', a.length, b, out);
      common.addCross(
        a.length,
        address(a.re),
        address(a.im),
        address(b.re),
        address(b.im),
        address(out.re),
        address(out.im),
      );
    },
    addMagnitude: (x, count, mean, spread) => {
      checkLengths('addMagnitude', x.length, mean, spread);
      common.addMagnitude(x.length, count, address(x.re), address(x.im), address(mean), address(spread));
    },
    medians: (rows, stride, count, out) => {
      checkLengths('medians', out.length + stride * (count - 1), rows);
      const work = heap.alloc(count * 80);
      try {
        common.medians(address(rows), stride * 8, count, out.length, work, address(out));
      } finally {
        heap.release(work);
      }
    },
    cascade: (x, count, backwards, coefficients, states) => {
      const sections = Math.floor(coefficients.length / 5);
      checkLengths('cascade', count, x);
      checkLengths('states of the cascade', 2 * sections, states);
      const start = address(x) + (backwards ? (count - 1) * 8 : 0);
      common.cascade(start, count, backwards ? -8 : 8, sections, address(coefficients), address(states));
    },
  };
}
