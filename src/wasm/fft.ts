// Complex transforms of any length. A plan is a header followed by its tables, laid out by one walk that either only
// measures (dry) or also fills. Inverse transform (unscaled): the same call with re and im exchanged.
import { fillChirp, fillChirpSpectrum, paddedLength, runChirp } from './fft-chirp';
import { layOutPasses, passesScratch, runPasses } from './fft-passes';
import { aligned, HEADER, KIND_CHIRP, KIND_ONE, KIND_VECTOR, kindOf, rowBytes } from './fft-plan';

/** Lays out the plan of length n at `plan` and returns where it ends; writes nothing when dry. */
function layOut<T>(plan: usize, n: i32, scratch: usize, dry: bool): usize {
  const kind = kindOf<T>(n);
  if (!dry) {
    memory.fill(plan, 0, HEADER);
    store<i32>(plan, n);
    store<i32>(plan, kind, 4);
  }
  const tables = aligned(plan + HEADER);
  if (kind == KIND_CHIRP) {
    const m = paddedLength(n);
    const spectrum = aligned(tables + 2 * rowBytes<T>(n));
    const inner = aligned(spectrum + 2 * rowBytes<T>(m));
    const end = layOut<T>(inner, m, scratch, dry);
    if (!dry) {
      store<i32>(plan, m, 12);
      store<usize>(plan, tables, 16);
      store<usize>(plan, spectrum, 20);
      store<usize>(plan, inner, 24);
      fillChirp<T>(tables, n);
      fillChirpSpectrum<T>(tables, n, m, inner, spectrum, scratch);
    }
    return end;
  }
  return layOutPasses<T>(plan, n, kind == KIND_VECTOR, dry);
}

/** Bytes a plan of length n takes. */
export function planBytes<T>(n: i32): usize {
  return layOut<T>(0, n, 0, true) + 64;
}

/** Bytes of scratch a transform of length n needs (building the plan needs no more). */
export function scratchBytes<T>(n: i32): usize {
  const kind = kindOf<T>(n);
  if (kind == KIND_ONE) return 64;
  if (kind != KIND_CHIRP) return passesScratch<T>(n);
  const m = paddedLength(n);
  return 4 * rowBytes<T>(m) + scratchBytes<T>(m);
}

export function planInit<T>(plan: usize, n: i32, scratch: usize): void {
  layOut<T>(plan, n, scratch, false);
}

/** y = sum_j x[j] exp(-2 pi i j k / n), unscaled; x may be y. */
export function transform<T>(plan: usize, xr: usize, xi: usize, yr: usize, yi: usize, scratch: usize): void {
  const kind = load<i32>(plan, 4);
  if (kind == KIND_ONE) {
    const re = load<T>(xr);
    const im = load<T>(xi);
    store<T>(yr, re);
    store<T>(yi, im);
  } else if (kind == KIND_CHIRP) runChirp<T>(plan, xr, xi, yr, yi, scratch);
  else runPasses<T>(plan, xr, xi, yr, yi, scratch, false);
}

/** Transform of 2 n real samples read as n complex numbers; false where the plan cannot read them in place. */
export function transformPairs<T>(plan: usize, x: usize, yr: usize, yi: usize, scratch: usize): bool {
  if (load<i32>(plan, 4) != KIND_VECTOR) return false;
  runPasses<T>(plan, x, 0, yr, yi, scratch, true);
  return true;
}
