import type { Series } from '../data/kinds';
import type { Warning } from '../data/quantity';
import { spanLength } from '../data/spans';
import { counted, numberText, withUnit } from '../figures/number-text';
import { gapsOf, secondsOf, type SeriesScan } from './sample-scan';

/** Runs of unusable samples from this many seconds on are called gaps, shorter ones bad samples. */
const GAP_SECONDS = 1;
/** Smallest positive float32 that keeps all its digits. */
const FLOAT32_NORMAL = 1.1754943508222875e-38;
/** Relative distance from a likely rate at which a rate looks mistaken rather than odd. */
const NEAR = 5e-3;

/** What a first look has to warn of, most serious first. */
export function overviewWarnings(series: Series, scan: SeriesScan): Warning[] {
  const found = [
    ...empty(series, scan),
    ...holes(series),
    ...constant(series, scan),
    ...saturated(series, scan),
    ...zeros(series, scan),
    ...counts(series, scan),
    ...rate(series),
    ...start(series),
    ...small(series, scan),
  ];
  const order = { problem: 0, caution: 1, note: 2 };
  return found.sort((a, b) => order[a.severity] - order[b.severity]);
}

function empty(series: Series, { used }: SeriesScan): Warning[] {
  if (used > 0) return [];
  return [
    {
      code: 'no-valid-samples',
      severity: 'problem',
      found: `none of the ${series.length} samples can be used`,
      value: series.length,
      consequence: 'Nothing can be computed from this span.',
      remedy: 'Choose another span or channel.',
    },
  ];
}

function start(series: Series): Warning[] {
  if (series.startUnknown !== true) return [];
  return [
    {
      code: 'start-unknown',
      severity: 'note',
      found: 'the file does not say when its first sample was taken',
      consequence: 'Times count from GPS 0 and mean only the distance from the first sample.',
      remedy: 'Give the GPS time of the first sample as "epoch" of the input.',
    },
  ];
}

function holes(series: Series): Warning[] {
  const out: Warning[] = [];
  const all = gapsOf(series);
  const long = all.filter((s) => s.to - s.from >= GAP_SECONDS * series.rate);
  const short = all.filter((s) => s.to - s.from < GAP_SECONDS * series.rate);
  if (short.length > 0) {
    const n = spanLength(short);
    out.push({
      code: 'not-finite',
      severity: 'caution',
      found: `${counted(n, 'sample')} in ${counted(short.length, 'short run')} not a finite number or missing`,
      value: n,
      consequence:
        'One such sample would make a whole spectrum undefined, so each splits the data; segments that touch it are left out.',
      remedy: 'Nothing needs to be done; to use the data across it, repair the file at its source.',
    });
  }
  if (long.length > 0) {
    const seconds = secondsOf(long, series);
    out.push({
      code: 'gaps',
      severity: 'caution',
      found: `${counted(long.length, 'gap')} of ${GAP_SECONDS} s or more, ${numberText(seconds)} s together (${percent(seconds, series.length / series.rate)})`,
      value: seconds,
      consequence:
        'Gaps are never filled: every step works on the spans between them and says what it left out.',
      remedy:
        'Choose a span without a gap where a step needs one long stretch; the table of spans lists them.',
    });
  }
  return out;
}

function constant(series: Series, { stats, used }: SeriesScan): Warning[] {
  if (used < 2 || stats.min !== stats.max) return [];
  return [
    {
      code: 'constant',
      severity: 'problem',
      found: `all ${used} valid samples are ${withUnit(stats.min, series.unit)}`,
      value: stats.min,
      consequence: 'There is no signal and no noise in it; spectra of it are zero.',
      remedy: 'Check the channel name and whether the instrument was recording.',
    },
  ];
}

function saturated(series: Series, { stats, saturated: runs }: SeriesScan): Warning[] {
  if (runs.length === 0) return [];
  return [
    {
      code: 'saturated',
      severity: 'caution',
      found: `${counted(stats.saturated, 'sample')} in ${counted(runs.length, 'run')} of 8 or more at the smallest or largest value (${withUnit(stats.min, series.unit)}, ${withUnit(stats.max, series.unit)})`,
      value: stats.saturated,
      consequence: 'The signal was cut off there; the sharp corners spread power over all frequencies.',
      remedy: 'Leave these times out (parameter "exclude" of the noise spectrum) or choose another span.',
    },
  ];
}

function zeros(series: Series, { stats, zeros: runs }: SeriesScan): Warning[] {
  if (runs.length === 0 || stats.min === stats.max) return [];
  const seconds = secondsOf(runs, series);
  return [
    {
      code: 'digital-zeros',
      severity: 'caution',
      found: `${counted(runs.length, 'stretch', 'stretches')} of exact zeros, ${numberText(seconds)} s together, the first at ${numberText(runs[0].from / series.rate, 9)} s`,
      value: seconds,
      consequence: 'Missing data filled with zeros counts as quiet data and lowers every noise estimate.',
      remedy: 'Leave these times out (parameter "exclude" of the noise spectrum) or choose another span.',
    },
  ];
}

function counts(series: Series, { stats, whole }: SeriesScan): Warning[] {
  const size = Math.max(Math.abs(stats.min), Math.abs(stats.max));
  if (!whole || stats.min === stats.max || size < 2 || /^counts?$/i.test(series.unit)) return [];
  return [
    {
      code: 'unscaled-counts',
      severity: 'caution',
      found: `every sample is a whole number, up to ${numberText(size, 9)}, under the unit "${series.unit}"`,
      value: size,
      consequence: `These look like readings of a digitiser that were never scaled; densities would not be in ${series.unit === '' ? 'the unit meant' : `${series.unit}²/Hz`}.`,
      remedy: 'Set "scale" of the input to the value of one count, or its "unit" to "counts".',
    },
  ];
}

function rate(series: Series): Warning[] {
  const r = series.rate;
  const whole = Math.round(r);
  const power = 2 ** Math.round(Math.log2(r));
  const likely =
    r > 64 && r !== power && Math.abs(r / power - 1) < NEAR
      ? power
      : r > 1 && r !== whole
        ? whole
        : undefined;
  if (likely === undefined || Math.abs(r / likely - 1) >= NEAR) return [];
  const drift = (Math.abs(r / likely - 1) * series.length) / r;
  return [
    {
      code: 'rate-doubtful',
      severity: 'caution',
      found: `the sample rate ${numberText(r, 12)} Hz is ${numberText(100 * Math.abs(r / likely - 1), 3)} % off ${likely} Hz`,
      value: r,
      consequence: `Should ${likely} Hz be meant, times are wrong by up to ${numberText(drift, 3)} s at the end of this span and all frequencies by the same share.`,
      remedy: `A time column of few decimals gives such rates. If it is wrong, set "rate" of the input to ${likely}.`,
    },
  ];
}

/** Whether the first samples are all float32 values: who stores strain so is likely to compute with it so. */
function looksFloat32(series: Series): boolean {
  return series.read(0, Math.min(series.length, 4096)).every((v) => Number.isNaN(v) || Math.fround(v) === v);
}

function small(series: Series, { deviation }: SeriesScan): Warning[] {
  const density = (2 * deviation ** 2) / series.rate;
  if (!(deviation > 0 && density < FLOAT32_NORMAL && looksFloat32(series))) return [];
  return [
    {
      code: 'float32-underflow',
      severity: 'note',
      found: `the samples are float32 values, and their mean power density is ${numberText(density, 2)} in the unit squared per Hz, below the smallest normal float32 (1.18e-38)`,
      value: density,
      consequence:
        'In single precision most bins of a power spectrum would become exactly zero. All computing here is in float64 and not affected.',
      remedy: 'In scripts of your own keep float64, or scale the samples first (by 1e21, say).',
    },
  ];
}

function percent(part: number, whole: number): string {
  return `${numberText((100 * part) / whole, 3)} %`;
}
