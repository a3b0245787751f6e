import type { ComplexArray, KernelArray, Precision } from './complex-arrays';
import { checkLengths, checkTransformLength, type FftPlan, type RfftPlan } from './kernels-backend';
import { address } from './wasm-array';
import type { WasmInstance } from './wasm-module';
import type { WasmPlans } from './wasm-plans';

/** Complex plan over the wasm transforms; the inverse is the forward transform with re and im exchanged. */
export function wasmFftPlan<P extends Precision>(
  instance: WasmInstance,
  plans: WasmPlans,
  length: number,
  precision: P,
): FftPlan<P> {
  checkTransformLength(length);
  const f = instance.typed[precision];
  const plan = plans.plan(length, precision, false);
  const what = `transform of length ${length}`;
  const run = (xr: KernelArray, xi: KernelArray, yr: KernelArray, yi: KernelArray): void => {
    checkLengths(what, length, xr, yr);
    const scratch = plans.ready(plan);
    f.transform(plan.at, address(xr), address(xi), address(yr), address(yi), scratch);
  };
  return {
    length,
    precision,
    forward: (x, y) => run(x.re, x.im, y.re, y.im),
    backward: (x, y) => run(x.im, x.re, y.im, y.re),
  };
}

/** Real plan over the wasm transforms. */
export function wasmRfftPlan<P extends Precision>(
  instance: WasmInstance,
  plans: WasmPlans,
  length: number,
  precision: P,
): RfftPlan<P> {
  checkTransformLength(length);
  const f = instance.typed[precision];
  const plan = plans.plan(length, precision, true);
  const bins = Math.floor(length / 2) + 1;
  const what = `real transform of length ${length}`;
  const whatBins = `spectrum of ${length} real samples`;
  const check = (samples: KernelArray, spectrum: ComplexArray): void => {
    checkLengths(what, length, samples);
    checkLengths(whatBins, bins, spectrum);
  };
  return {
    length,
    bins,
    precision,
    forward: (x, y) => {
      check(x, y);
      const scratch = plans.ready(plan);
      f.realForward(plan.at, address(x), address(y.re), address(y.im), scratch);
    },
    backward: (x, y) => {
      check(y, x);
      const scratch = plans.ready(plan);
      f.realBackward(plan.at, address(x.re), address(x.im), address(y), scratch);
    },
  };
}
