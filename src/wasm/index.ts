// Exports of the kernels' module: one instance per element type where a kernel is generic.
import * as complex from './complex';
import * as fft from './fft';
import * as real from './fft-real';

export { cascade, cascadePlain } from './sections';
export { medians } from './select';
export { addCross, addMagnitude, addPower, power, taper } from './spectra';

/** Largest squared magnitude seen by the last energy or peak. */
export function largest(): f64 {
  return complex.largest;
}

export function planBytes64(n: i32): usize {
  return fft.planBytes<f64>(n);
}
export function scratchBytes64(n: i32): usize {
  return fft.scratchBytes<f64>(n);
}
export function planInit64(plan: usize, n: i32, scratch: usize): void {
  fft.planInit<f64>(plan, n, scratch);
}
export function transform64(plan: usize, xr: usize, xi: usize, yr: usize, yi: usize, scratch: usize): void {
  fft.transform<f64>(plan, xr, xi, yr, yi, scratch);
}
export function realPlanBytes64(n: i32): usize {
  return real.realPlanBytes<f64>(n);
}
export function realScratchBytes64(n: i32): usize {
  return real.realScratchBytes<f64>(n);
}
export function realPlanInit64(plan: usize, n: i32, scratch: usize): void {
  real.realPlanInit<f64>(plan, n, scratch);
}
export function realForward64(plan: usize, x: usize, yr: usize, yi: usize, scratch: usize): void {
  real.realForward<f64>(plan, x, yr, yi, scratch);
}
export function realBackward64(plan: usize, xr: usize, xi: usize, y: usize, scratch: usize): void {
  real.realBackward<f64>(plan, xr, xi, y, scratch);
}
export function multiply64(n: i32, ar: usize, ai: usize, br: usize, bi: usize, or: usize, oi: usize): void {
  complex.multiply<f64>(n, ar, ai, br, bi, or, oi);
}
export function multiplyConj64(n: i32, ar: usize, ai: usize, br: usize, bi: usize, or: usize, oi: usize): void {
  complex.multiplyConj<f64>(n, ar, ai, br, bi, or, oi);
}
export function windowed64(
  n: i32, m: i32, xr: usize, xi: usize, w: usize, factor: f64, or: usize, oi: usize,
): void {
  complex.windowed<f64>(n, m, xr, xi, w, factor, or, oi);
}
export function energy64(n: i32, r: usize, i: usize, o: usize): f64 {
  return complex.energy<f64>(n, r, i, o);
}
export function peak64(n: i32, r: usize, i: usize): i32 {
  return complex.peak<f64>(n, r, i);
}

export function planBytes32(n: i32): usize {
  return fft.planBytes<f32>(n);
}
export function scratchBytes32(n: i32): usize {
  return fft.scratchBytes<f32>(n);
}
export function planInit32(plan: usize, n: i32, scratch: usize): void {
  fft.planInit<f32>(plan, n, scratch);
}
export function transform32(plan: usize, xr: usize, xi: usize, yr: usize, yi: usize, scratch: usize): void {
  fft.transform<f32>(plan, xr, xi, yr, yi, scratch);
}
export function realPlanBytes32(n: i32): usize {
  return real.realPlanBytes<f32>(n);
}
export function realScratchBytes32(n: i32): usize {
  return real.realScratchBytes<f32>(n);
}
export function realPlanInit32(plan: usize, n: i32, scratch: usize): void {
  real.realPlanInit<f32>(plan, n, scratch);
}
export function realForward32(plan: usize, x: usize, yr: usize, yi: usize, scratch: usize): void {
  real.realForward<f32>(plan, x, yr, yi, scratch);
}
export function realBackward32(plan: usize, xr: usize, xi: usize, y: usize, scratch: usize): void {
  real.realBackward<f32>(plan, xr, xi, y, scratch);
}
export function multiply32(n: i32, ar: usize, ai: usize, br: usize, bi: usize, or: usize, oi: usize): void {
  complex.multiply<f32>(n, ar, ai, br, bi, or, oi);
}
export function multiplyConj32(n: i32, ar: usize, ai: usize, br: usize, bi: usize, or: usize, oi: usize): void {
  complex.multiplyConj<f32>(n, ar, ai, br, bi, or, oi);
}
export function windowed32(
  n: i32, m: i32, xr: usize, xi: usize, w: usize, factor: f64, or: usize, oi: usize,
): void {
  complex.windowed<f32>(n, m, xr, xi, w, factor, or, oi);
}
export function energy32(n: i32, r: usize, i: usize, o: usize): f64 {
  return complex.energy<f32>(n, r, i, o);
}
export function peak32(n: i32, r: usize, i: usize): i32 {
  return complex.peak<f32>(n, r, i);
}

/** First byte after the module's own data. */
export function heapBase(): usize {
  return __heap_base;
}
