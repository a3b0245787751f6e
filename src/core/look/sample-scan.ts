import type { Envelope, SampleStats, Series } from '../data/kinds';
import { scanSamples } from '../data/scan';
import { complementSpans, cropSpans, spanLength, type Span } from '../data/spans';
import { emptyEnvelope, foldEnvelope } from '../figures/envelope';
import { robustWidth, type RobustWidth } from './robust-width';
import { RunningMoments } from './running-moments';

const BLOCK = 1 << 18;
const BINS = 120;
const REACH = 6;

/** Everything the first inspection of a series finds out about its valid samples. */
export interface SeriesScan {
  readonly stats: SampleStats;
  /** Valid samples: finite, and not spoilt by a filter's edge. */
  readonly used: number;
  /** Standard deviation about the mean. */
  readonly deviation: number;
  readonly robust: RobustWidth;
  /** Of all samples that exist, spoilt ones included. */
  readonly envelope: Envelope;
  /** The end bins also hold everything beyond them. */
  readonly histogram: { readonly edges: Float64Array; readonly counts: Float64Array };
  readonly saturated: readonly Span[];
  /** Runs of exact zeros. */
  readonly zeros: readonly Span[];
  /** Whether every valid sample is a whole number. */
  readonly whole: boolean;
}

/**
 * Inspects the valid samples of a series block by block. An input brings the findings of its first reading along and is
 * read once more for the histogram; a series made by a step is read twice.
 *
 * @param block called once per block with the fraction done
 */
export async function scanSeries(
  series: Series,
  block: (fraction: number) => Promise<void>,
): Promise<SeriesScan> {
  const passes = series.scan ? 1 : 2;
  const scan =
    series.scan ??
    (await scanSamples((from, to, into) => readValid(series, from, to, into), series.length, {
      rate: series.rate,
      block: (fraction) => block(fraction / passes),
    }));
  const robust = robustWidth(series);
  const edges = histogramEdges(robust);
  const counts = new Float64Array(edges.length - 1);
  const envelope = series.scan?.envelope ?? emptyEnvelope(series.length);
  const moments = new RunningMoments();
  let whole = true;
  const buffer = new Float64Array(Math.min(BLOCK, series.length));
  for (let from = 0; from < series.length; from += BLOCK) {
    await block((passes - 1 + from / series.length) / passes);
    const to = Math.min(series.length, from + BLOCK);
    const samples = buffer.subarray(0, to - from);
    series.read(from, to, samples);
    if (!series.scan) foldEnvelope(envelope, samples, to - from, from);
    for (const span of cropSpans(series.valid, from, to)) {
      moments.take(samples, span.from, span.to);
      const part = samples.subarray(span.from, span.to);
      count(part, edges, counts);
      whole &&= part.every(Number.isInteger);
    }
  }
  return {
    stats: scan.stats,
    used: moments.count,
    deviation: moments.deviation,
    robust,
    envelope,
    histogram: { edges, counts },
    saturated: scan.saturated.spans,
    zeros: scan.zeros.spans,
    whole: whole && moments.count > 0,
  };
}

/** Reads samples with NaN for all that is not valid. */
function readValid(series: Series, from: number, to: number, into: Float64Array): void {
  series.read(from, to, into);
  for (const gap of complementSpans(cropSpans(series.valid, from, to), to - from))
    into.fill(NaN, gap.from, gap.to);
}

/** 120 bins over ±6 robust widths about the median; for whole numbers every bin holds equally many of them. */
function histogramEdges({ median, width, whole }: RobustWidth): Float64Array {
  const centre = Number.isFinite(median) ? median : 0;
  let bin = (2 * REACH * width) / BINS;
  if (!(bin > Math.abs(centre) * 1e-14)) bin = (2 * (Math.abs(centre) || 1)) / BINS;
  if (whole) bin = Math.max(1, Math.round(bin));
  const first = whole ? Math.round(centre) - 0.5 - (BINS / 2) * bin : centre - (BINS / 2) * bin;
  return Float64Array.from({ length: BINS + 1 }, (_, k) => first + k * bin);
}

function count(samples: Float64Array, edges: Float64Array, counts: Float64Array): void {
  const first = edges[0];
  const perBin = counts.length / (edges.at(-1)! - first);
  const last = counts.length - 1;
  for (const v of samples) {
    const k = Math.floor((v - first) * perBin);
    counts[k < 0 ? 0 : k > last ? last : k]++;
  }
}

/** Samples of a series that are neither valid nor merely spoilt by a filter's edge. */
export function gapsOf(series: Series): Span[] {
  return complementSpans([...series.valid, ...(series.spoilt ?? [])], series.length);
}

/** Seconds that spans of a series cover. */
export function secondsOf(spans: readonly Span[], series: Series): number {
  return spanLength(spans) / series.rate;
}
