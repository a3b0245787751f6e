import type { Waveform } from '../../src/core/data/kinds';
import { createKernels } from '../../src/core/kernels/kernels';

const kernels = createKernels(undefined);

/** Adds factor · h(t − at) to samples in place (circular over them), h real with transform h̃ e^(iφ) for f > 0. */
export function addWave(
  samples: Float64Array,
  rate: number,
  wave: Waveform,
  at: number,
  factor: number,
  phase = 0,
): void {
  const n = samples.length;
  const f = Float64Array.from({ length: n / 2 + 1 }, (_, k) => (k * rate) / n);
  const { re, im } = wave.at(f);
  const r = new Float64Array(f.length);
  const i = new Float64Array(f.length);
  for (let k = 1; k < n / 2; k++) {
    const a = phase - 2 * Math.PI * f[k] * at;
    r[k] = factor * rate * (re[k] * Math.cos(a) - im[k] * Math.sin(a));
    i[k] = factor * rate * (re[k] * Math.sin(a) + im[k] * Math.cos(a));
  }
  kernels.irfft(r, i, n).forEach((v, j) => (samples[j] += v));
}
