import type { Spectrum, Waveform } from '../../src/core/data/kinds';

/** A waveform from its h̃(f). */
export function waveformOf(
  transform: (f: number) => readonly [re: number, im: number],
  over: Partial<Waveform> & Pick<Waveform, 'low' | 'high'>,
): Waveform {
  const at = (frequency: Float64Array): { re: Float64Array; im: Float64Array } => {
    const re = new Float64Array(frequency.length);
    const im = new Float64Array(frequency.length);
    frequency.forEach((f, k) => {
      if (f >= over.low && f <= over.high) [re[k], im[k]] = transform(f);
    });
    return { re, im };
  };
  const df = 0.25;
  const bins = at(Float64Array.from({ length: Math.floor(over.high / df) + 2 }, (_, k) => k * df));
  return {
    kind: 'waveform',
    label: 'test wave',
    model: 'test',
    facts: [],
    reference: 'face on, straight above (optimal)',
    polarisation: 'circular',
    quadrupole: true,
    df,
    ...bins,
    before: 0.5,
    after: 0.5,
    duration: 1,
    origin: 'amplitude peak',
    at,
    ...over,
  };
}

/** A burst e^(−(t/τ)²) cos 2πf₀t of amplitude `h0`, and its transform for f > 0. */
export const burst = (f0: number, tau: number, h0: number, over: Partial<Waveform> = {}): Waveform =>
  waveformOf((f) => [(h0 * tau * Math.sqrt(Math.PI) * Math.exp(-((Math.PI * tau * (f - f0)) ** 2))) / 2, 0], {
    low: 20,
    high: 500,
    ...over,
  });

/** A Newtonian inspiral ending at 300 Hz: amplitude f^(−7/6), phase (3/128) (πMf)^(−5/3), M chirp mass in s. */
export const inspiral = (chirpSeconds: number, amplitude: number, over: Partial<Waveform> = {}): Waveform =>
  waveformOf(
    (f) => {
      const psi = (3 / 128) * (Math.PI * chirpSeconds * f) ** (-5 / 3);
      const a = amplitude * f ** (-7 / 6);
      return [a * Math.cos(psi), -a * Math.sin(psi)];
    },
    { low: 25, high: 300, distance: 100, ...over },
  );

/** A spectrum of a given one-sided density on bins of `df` up to `top` Hz. */
export function spectrumOf(density: (f: number) => number, df: number, top: number): Spectrum {
  const frequency = Float64Array.from({ length: Math.round(top / df) + 1 }, (_, k) => k * df);
  return {
    kind: 'spectrum',
    label: 'noise model of the test',
    frequency,
    density: frequency.map(density),
    df,
    unit: 'strain²/Hz',
  };
}
