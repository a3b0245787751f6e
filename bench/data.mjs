// Inputs of the works, the same numbers on both sides: written once to a folder both read.
import { readFileSync, writeFileSync } from 'node:fs';

export const RATE = 4096;

/** Gaussian noise from a fixed seed: xorshift32 (Marsaglia, J. Stat. Softw. 8, 14, 2003) and Box-Muller. */
export function gaussian(n, seed) {
  let s = seed >>> 0;
  const uniform = () => {
    s ^= s << 13;
    s >>>= 0;
    s ^= s >>> 17;
    s ^= s << 5;
    s >>>= 0;
    return (s + 0.5) / 4294967296;
  };
  const out = new Float64Array(n);
  for (let i = 0; i < n; i++)
    out[i] = Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
  return out;
}

/** Order-8 Butterworth band-pass and five notches, designed by SciPy (test/oracle/zero-phase.py). */
export function sections() {
  const { cases } = JSON.parse(
    readFileSync(new URL('../test/oracle/zero-phase.json', import.meta.url), 'utf8'),
  );
  return cases.find((c) => c.sos.length === 13).sos;
}

/** Tiles of a constant-Q map of 64 s: five Q, forty frequencies each, bisquare windows in frequency. */
export function tiles() {
  const span = 64;
  const out = [];
  for (const q of [4, 8, 16, 32, 64]) {
    const top = Math.min(1600, (RATE / 2 / (1 + Math.sqrt(11) / q)) * 0.99);
    for (let i = 0; i < 40; i++) {
      const f = 20 * (top / 20) ** (i / 39);
      const half = (f * Math.sqrt(11)) / q;
      const low = Math.max(1, Math.ceil((f - half) * span));
      const high = Math.floor((f + half) * span);
      const weights = Array.from(
        { length: high - low + 1 },
        (_, k) => (1 - (((low + k) / span - f) / half) ** 2) ** 2,
      );
      out.push({ q, f, low, weights, length: 2 ** Math.max(6, Math.ceil(Math.log2(weights.length))) });
    }
  }
  return out;
}

const files = {
  noise64: () => gaussian(64 * RATE, 1234567),
  noise4096: () => gaussian(4096 * RATE, 7654321),
  spectrum: () => gaussian(2 * (2 ** 18 + 1), 99),
  templates: () => gaussian(64 * 2 * (2 ** 18 + 1), 77),
};
const made = new Map();

/** Numbers of one input; also written to `folder` for the other side. */
export function input(folder, name) {
  if (!made.has(name)) {
    const values = files[name]();
    writeFileSync(`${folder}/${name}.f64`, values);
    made.set(name, values);
  }
  return made.get(name);
}
