import { UserError } from '../data/errors';
import { formatGps } from '../data/gps-time';
import type { ConsistentPeak, SnrSeries } from '../data/kinds';
import type { Split } from '../kernels/complex-arrays';
import type { Kernels } from '../kernels/kernels';
import { chiSquaredParts, chiSquaredTail, equalBands, reweighted, type Bands } from './consistency-bands';
import { autocorrelation, chooseLags, shapeCheck } from './consistency-shape';
import { timeOf } from './matched-filter-numbers';
import { createBlockTransform } from './overlap-save';

/** What does not change from peak to peak. */
export interface ConsistencyPlan {
  readonly snr: SnrSeries;
  readonly bands: Bands;
  /** Samples to either side of a peak whose shape is compared. */
  readonly around: number;
  readonly correlation: Split;
}

/**
 * @param count number of bands
 * @param seconds to either side of a peak
 */
export function planConsistency(
  kernels: Kernels,
  snr: SnrSeries,
  count: number,
  seconds: number,
): ConsistencyPlan {
  const { re, im, inverse, size } = snr.filter;
  const weights = inverse.map((v, k) => (v === 0 ? 0 : (re[k] * re[k] + im[k] * im[k]) * v));
  const around = Math.max(1, Math.min(Math.round(seconds * snr.rate), Math.floor(size / 4)));
  return {
    snr,
    bands: equalBands(weights, count),
    around,
    correlation: autocorrelation(kernels, weights, size, 2 * around),
  };
}

/**
 * χ² and shape of the SNR at one instant, from one block of data around it.
 *
 * @param at sample index, fractional
 */
export function checkPeak(kernels: Kernels, plan: ConsistencyPlan, at: number): ConsistentPeak {
  const { snr, bands, correlation } = plan;
  const { filter } = snr;
  const middle = Math.round(at);
  const kept = snr.valid.find((s) => middle >= s.from && middle < s.to);
  const span = filter.series.valid.find((s) => middle >= s.from && middle < s.to);
  if (!kept || !span)
    throw new UserError(
      'time-not-valid',
      `there is no valid SNR at GPS ${formatGps(timeOf(snr, at))}: it is outside the data, in a gap, or in an edge dropped by the matched filter`,
    );
  const from = Math.max(span.from, Math.min(middle - filter.size / 2, span.to - filter.size));
  const to = Math.min(span.to, from + filter.size);
  const { re, im } = filteredSpectrum(kernels, snr, from, to, at - middle);
  const n0 = middle - from;

  const count = bands.shares.length;
  const parts = { re: new Float64Array(count), im: new Float64Array(count) };
  for (let l = 0; l < count; l++) {
    for (let k = bands.bounds[l]; k < bands.bounds[l + 1]; k++) {
      // The product k · n0 stays an exact integer; taken modulo the period it keeps the phase exact too.
      const angle = (2 * Math.PI * ((k * n0) % filter.size)) / filter.size;
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      parts.re[l] += re[k] * c - im[k] * s;
      parts.im[l] += re[k] * s + im[k] * c;
    }
  }
  const added = chiSquaredParts(parts.re, parts.im, bands.shares);
  const sum = (x: Float64Array): number => x.reduce((a, v) => a + v, 0);
  const rho = { re: sum(parts.re), im: sum(parts.im) };
  const chiSquared = sum(added);
  const freedom = 2 * count - 2;
  const ratio = Math.hypot(rho.re, rho.im);

  const lags = chooseLags(
    Math.min(plan.around, middle - kept.from),
    Math.min(plan.around, kept.to - 1 - middle),
  );
  const values = valuesAt(kernels, re, im, filter.size, lags, n0);
  const expected = new Float64Array(lags.length);
  const rest = { re: new Float64Array(lags.length), im: new Float64Array(lags.length) };
  lags.forEach((lag, i) => {
    const rr = correlation.re[Math.abs(lag)];
    const ri = lag < 0 ? -correlation.im[-lag] : correlation.im[lag];
    expected[i] = ratio * Math.hypot(rr, ri);
    rest.re[i] = values.re[i] - (rho.re * rr - rho.im * ri);
    rest.im[i] = values.im[i] - (rho.re * ri + rho.im * rr);
  });
  const shape = shapeCheck(rest, lags, correlation);
  return {
    time: timeOf(snr, at),
    snr: ratio,
    chiSquared,
    freedom,
    pValue: chiSquaredTail(chiSquared, freedom),
    reweighted: reweighted(ratio, chiSquared / freedom),
    edges: Float64Array.from(bands.bounds, (k) => (k * snr.rate) / filter.size),
    parts: added,
    lag: Float64Array.from(lags, (l) => l / snr.rate),
    around: values.re.map((v, i) => Math.hypot(v, values.im[i])),
    expected,
    shape: shape.ratio,
    shapePValue: shape.pValue,
  };
}

/** X conj(Q) on bins 0 … size / 2 of samples `[from, to)`, shifted by a part of a sample; its backward transform is the SNR. */
function filteredSpectrum(kernels: Kernels, snr: SnrSeries, from: number, to: number, shift: number): Split {
  const { filter } = snr;
  const transform = createBlockTransform(kernels, filter.series, filter.size, filter.fade);
  try {
    const x = transform.load(from, to);
    const xr = x.re.view();
    const xi = x.im.view();
    const scale = 4 / (filter.size * snr.template.sigma);
    const re = new Float64Array(filter.inverse.length);
    const im = new Float64Array(filter.inverse.length);
    for (let k = 0; k < re.length; k++) {
      const w = filter.inverse[k] * scale;
      if (w === 0) continue;
      const [hr, hi] = [filter.re[k] * w, filter.im[k] * w];
      const pr = xr[k] * hr + xi[k] * hi;
      const pi = xi[k] * hr - xr[k] * hi;
      const angle = (2 * Math.PI * k * shift) / filter.size;
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      re[k] = pr * c - pi * s;
      im[k] = pr * s + pi * c;
    }
    return { re, im };
  } finally {
    transform.free();
  }
}

function valuesAt(
  kernels: Kernels,
  re: Float64Array,
  im: Float64Array,
  size: number,
  lags: Int32Array,
  n0: number,
): Split {
  const work = kernels.complex(size, 'f64');
  try {
    work.re.set(re);
    work.im.set(im);
    kernels.fftPlan(size, 'f64').backward(work, work);
    const r = work.re.view();
    const i = work.im.view();
    return {
      re: Float64Array.from(lags, (lag) => r[n0 + lag]),
      im: Float64Array.from(lags, (lag) => i[n0 + lag]),
    };
  } finally {
    work.free();
  }
}
