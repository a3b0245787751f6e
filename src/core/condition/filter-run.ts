import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import type { Quantity, Warning } from '../data/quantity';
import { spanLength } from '../data/spans';
import { counted, numberText, repeated, withUnit } from '../figures/number-text';
import type { SectionRows } from '../kernels/kernels';
import { ringing } from '../kernels/sections-response-ringing';
import { RunningMoments } from '../look/running-moments';
import type { StepContext } from '../steps/define';
import { filteredSeries, type Direction } from './filter-series';
import { sweep } from './sweep';

/** Share of the valid time lost at edges from which on it is worth a word. */
const LOST = 0.2;
/** Edges below this part of the rate lose digits in the sections' coefficients. */
const DELICATE = 1e-6;

export interface FilterRequest {
  readonly rows: SectionRows;
  readonly direction: Direction;
  /** Seconds; null: computed from the ringing. */
  readonly crop: number | null;
  /** Put behind the label of the series: "high-passed". */
  readonly word: string;
  /** Lowest frequency in Hz at which the filter does something, for the check of its digits. */
  readonly lowest: number;
}

export interface Filtered {
  readonly data: Series;
  readonly crop: number;
  readonly numbers: readonly Quantity[];
  readonly warnings: readonly Warning[];
  /** Sentence on edges and notes, to follow what the filter is. */
  readonly ending: string;
}

/** Runs a filter over a series: the data, and what every filter step has to say about edges and ringing. */
export async function runFilter(
  series: Series,
  request: FilterRequest,
  context: StepContext,
): Promise<Filtered> {
  const { rows, direction } = request;
  const ring = ringing(rows, series.rate).length;
  const crop = request.crop ?? ring;
  const pass = {
    rows,
    direction,
    crop: Math.ceil(crop * series.rate - 1e-9),
    label: `${series.label}, ${request.word}`,
  };
  const data = filteredSeries(series, pass, context.kernels, context.memoryLimit);
  if (data.valid.length === 0) throw nothingLeft(series, crop);
  const moments = new RunningMoments();
  await sweep(
    data,
    (f) => context.block(f),
    (x) => moments.take(x, 0, x.length),
  );
  const kept = spanLength(data.valid) / data.rate;
  const had = spanLength(series.valid) / series.rate;
  const ends =
    direction === 'zero-phase' ? 'at both ends of each valid span' : 'at the start of each valid span';
  return {
    data,
    crop,
    numbers: [
      {
        id: 'ringing',
        label: 'Ringing',
        value: ring,
        unit: 's',
        convention: 'until 1 % of the amplitude is left',
      },
      { id: 'crop', label: 'Cropped', value: crop, unit: 's', convention: ends },
      { id: 'kept', label: 'Valid', value: kept, unit: 's', convention: 'samples over rate' },
      {
        id: 'rms',
        label: 'RMS',
        value: moments.rms,
        unit: data.unit,
        convention: 'about zero, of the valid samples',
      },
    ],
    warnings: [
      ...causal(direction),
      ...shortCrop(crop, ring),
      ...lost(kept, had, crop),
      ...delicate(request.lowest, series.rate),
    ],
    ending: `${withUnit(crop, 's')} cropped ${ends}, ${counted(data.valid.length, 'valid span')} of ${withUnit(kept, 's', 7)} in all left.${repeated(data.notes)}`,
  };
}

function nothingLeft(series: Series, crop: number): UserError {
  const longest = series.valid.reduce((n, s) => Math.max(n, s.to - s.from), 0) / series.rate;
  return new UserError(
    longest === 0 ? 'no-data' : 'filter-long',
    longest === 0
      ? `${series.label} has no valid sample: choose another span of the file`
      : `the filter rings for ${numberText(crop)} s, and the longest valid span of ${series.label} is ${numberText(longest)} s: take a longer span, a lower order or Q, or set "crop" yourself`,
  );
}

function causal(direction: Direction): Warning[] {
  if (direction !== 'causal') return [];
  return [
    {
      code: 'delayed',
      severity: 'note',
      found: 'the filter is causal',
      consequence:
        'Everything comes later by the group delay, which differs with frequency: times read off are not those of the data.',
      remedy: 'Set "direction" to zero-phase to keep times.',
      fix: { kind: 'set', label: 'Zero-phase', params: { direction: 'zero-phase' } },
    },
  ];
}

function shortCrop(crop: number, ring: number): Warning[] {
  if (crop >= ring * 0.999) return [];
  return [
    {
      code: 'short-crop',
      severity: 'caution',
      found: `${withUnit(crop, 's')} are cropped, but the filter rings for ${withUnit(ring, 's')}`,
      value: crop / ring,
      consequence: 'Samples near the edges of valid spans hold the filter’s start, not the data.',
      remedy: 'Leave "crop" empty.',
      fix: { kind: 'set', label: 'Crop by the ringing', params: { crop: null } },
    },
  ];
}

function lost(kept: number, had: number, crop: number): Warning[] {
  const share = 1 - kept / had;
  if (!(share > LOST)) return [];
  return [
    {
      code: 'mostly-edges',
      severity: 'caution',
      found: `${numberText(100 * share, 3)} % of the valid data are edges: ${withUnit(crop, 's')} at each`,
      value: share,
      consequence: 'They are not used by later steps.',
      remedy: 'Take a longer span, one with fewer gaps, or a filter that rings less.',
    },
  ];
}

function delicate(lowest: number, rate: number): Warning[] {
  if (!(lowest < DELICATE * rate)) return [];
  return [
    {
      code: 'delicate',
      severity: 'problem',
      found: `the filter acts at ${withUnit(lowest, 'Hz')}, ${numberText(lowest / rate, 2)} of the sample rate`,
      value: lowest / rate,
      consequence:
        'The coefficients no longer hold the digits that this takes; the response may differ from the one drawn.',
      remedy: 'Resample to a lower rate first.',
    },
  ];
}
