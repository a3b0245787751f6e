import { cosTurns, exp } from './elementary';
import { noiseDensity, type NoiseCurve } from './noise-curve';
import { halfFromReal } from './transform';

/** A blip of instrumental origin: cos(2πf₀t + φ) under the envelope e^{−(t/τ)²} with τ = Q/(√2 πf₀). */
export interface Burst {
  /** Seconds after the start of the data, of the envelope's top. */
  readonly time: number;
  /** Hz */
  readonly frequency: number;
  readonly q: number;
  /** Turns. */
  readonly phase: number;
  /** Optimal SNR over the site's noise curve. */
  readonly snr: number;
}

/** Optimal SNR of bins 0 … N/2 of a transform (strain/Hz, spacing `df` Hz): √(4 Σ |h̃|²/S df), one-sided S, from 1 Hz up. */
export function optimalSnr(
  spectrum: { readonly re: Float64Array; readonly im: Float64Array },
  df: number,
  curve: NoiseCurve,
): number {
  let sum = 0;
  for (let k = Math.ceil(1 / df); k < spectrum.re.length; k++) {
    const power = spectrum.re[k] * spectrum.re[k] + spectrum.im[k] * spectrum.im[k];
    if (power > 0) sum += power / noiseDensity(curve, k * df);
  }
  return Math.sqrt(4 * sum * df);
}

/** Adds the burst in place, scaled to its SNR. Returns the amplitude of the sinusoid in strain. */
export function addBurst(samples: Float64Array, rate: number, curve: NoiseCurve, burst: Burst): number {
  const n = 4 * rate;
  const first = Math.floor(burst.time * rate) - n / 2;
  const tau = burst.q / (Math.SQRT2 * 3.141592653589793 * burst.frequency);
  const shape = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const t = (first + i) / rate - burst.time;
    const x = (t / tau) * (t / tau);
    if (x < 600) shape[i] = exp(-x) * cosTurns(burst.frequency * t + burst.phase);
  }
  const { re, im } = halfFromReal(shape);
  const unit = optimalSnr({ re: re.map((v) => v / rate), im: im.map((v) => v / rate) }, rate / n, curve);
  const amplitude = burst.snr / unit;
  for (let i = 0; i < n; i++) samples[first + i] = samples[first + i] + amplitude * shape[i];
  return amplitude;
}
