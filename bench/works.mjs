// Our side of every work: prepare once, then `run` does it and returns a few numbers to compare with the reference.
import { input, RATE, sections, tiles } from './data.mjs';

const fft = (precision) => (kernels, folder) => {
  const n = 2 ** 17;
  const noise = input(folder, 'noise64');
  const [x, y] = [kernels.complex(n, precision), kernels.complex(n, precision)];
  x.re.set(noise.subarray(0, n));
  x.im.set(noise.subarray(n, 2 * n));
  const plan = kernels.fftPlan(n, precision);
  return () => {
    for (let i = 0; i < 40; i++) plan.forward(x, y);
    return [1, 1000, 77777].map((k) => y.re.view()[k]);
  };
};

const welch = (kernels, folder) => {
  const x = input(folder, 'noise4096');
  const segment = 4 * RATE;
  const window = Float64Array.from(
    { length: segment },
    (_, i) => 0.5 - 0.5 * Math.cos((2 * Math.PI * i) / segment),
  );
  const segments = Math.floor((x.length - segment) / (segment / 2)) + 1;
  const scale = 2 / (RATE * window.reduce((s, w) => s + w * w, 0));
  return () => {
    const w = kernels.createWelch({ segment, window, detrend: 'constant', average: 'median', segments });
    w.addRun(x);
    w.endPass();
    const density = w.result().power.map((p) => p * scale);
    w.free();
    return [10, 400, 4000].map((k) => density[k]);
  };
};

const zeroPhase = (kernels, folder) => {
  const x = input(folder, 'noise4096');
  const sos = sections();
  const out = new Float64Array(x.length);
  return () => {
    kernels.zeroPhase(sos, x, out);
    return [1000, 1e6, 1.6e7].map((i) => out[i]);
  };
};

const constantQ = (kernels, folder) => {
  const n = 64 * RATE;
  const [x, spectrum] = [kernels.array(n, 'f32'), kernels.complex(n / 2 + 1, 'f32')];
  x.set(input(folder, 'noise64'));
  const plan = kernels.rfftPlan(n, 'f32');
  const rows = tiles().map((t) => {
    const weights = kernels.array(t.weights.length, 'f32');
    weights.set(t.weights);
    return {
      ...t,
      weights,
      part: spectrum.sub(t.low, t.low + weights.length),
      plan: kernels.fftPlan(t.length, 'f32'),
    };
  });
  const longest = Math.max(...rows.map((t) => t.length));
  const [a, b] = [kernels.complex(longest, 'f32'), kernels.complex(longest, 'f32')];
  const energies = kernels.array(longest, 'f32');
  return () => {
    plan.forward(x, spectrum);
    let best = [0, 0, 0];
    for (const t of rows) {
      const [band, series] = [a.sub(0, t.length), b.sub(0, t.length)];
      kernels.windowed(t.part, t.weights, 1, band);
      t.plan.backward(band, series);
      const { sum, max } = kernels.energy(series, energies);
      if ((max / sum) * t.length > best[0]) best = [(max / sum) * t.length, t.q, t.f];
    }
    return best;
  };
};

const matchedFilter = (precision) => (kernels, folder) => {
  const n = 2 ** 19;
  const bins = n / 2 + 1;
  const load = (values) => {
    const z = kernels.complex(bins, precision);
    z.re.set(values.subarray(0, bins));
    z.im.set(values.subarray(bins, 2 * bins));
    return z;
  };
  const data = load(input(folder, 'spectrum'));
  const all = input(folder, 'templates');
  const bank = Array.from({ length: 64 }, (_, i) => load(all.subarray(2 * bins * i, 2 * bins * (i + 1))));
  const [product, series] = [kernels.complex(n, precision), kernels.complex(n, precision)];
  const plan = kernels.fftPlan(n, precision);
  return () => {
    const found = bank.map((template) => {
      kernels.multiply(data, template, product);
      plan.backward(product, series);
      return kernels.peak(series);
    });
    return [found[0].index, found[63].index, found[31].value / n / n];
  };
};

/** Name, what may be spent at most relative to SciPy, and the tolerance of the comparison. */
export const works = [
  { name: 'fft-f64-2^17', bar: 0.9, tolerance: 1e-9, prepare: fft('f64') },
  { name: 'fft-f32-2^17', bar: 0.45, tolerance: 1e-4, prepare: fft('f32') },
  { name: 'welch-median-4096s', bar: 0.3, tolerance: 1e-10, prepare: welch },
  { name: 'zero-phase-4096s', bar: 0.75, tolerance: 1e-9, prepare: zeroPhase },
  { name: 'constant-q-64s', bar: 0.35, tolerance: 1e-4, prepare: constantQ },
  { name: 'matched-filter-f32', bar: 0.35, tolerance: 1e-4, prepare: matchedFilter('f32') },
  { name: 'matched-filter-f64', bar: 0.75, tolerance: 1e-9, prepare: matchedFilter('f64') },
];
