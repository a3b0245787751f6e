import type { Quantity, Warning } from '../data/quantity';
import type { Table } from '../data/table';
import { counted, numberText, withUnit } from '../figures/number-text';
import { coherenceInterval } from './coherence-level';
import type { FrequencyRange } from './frequency-ranges';

/** Fewer effective averages than this make coherence a poor witness. */
const FEW = 10;
const LEVEL_SOURCE = 'Carter, Knapp, Nuttall, IEEE Trans. Audio Electroacoust. AU-21, 337 (1973), MEMORY';

export interface CoherenceFacts {
  readonly names: readonly [string, string];
  readonly segments: number;
  readonly averages: number;
  readonly frequency: Float64Array;
  readonly coherence: Float64Array;
  readonly phase: Float64Array;
  /** Bins that are judged, `[from, to)`. */
  readonly judged: readonly [number, number];
  readonly falseProbability: number;
  /** Level of one bin, and of all judged bins together. */
  readonly level: number;
  readonly searchLevel: number;
  readonly ranges: readonly FrequencyRange[];
  /** Samples by which the sampling instants of the two differ. */
  readonly fraction: number;
}

interface Counts {
  readonly bins: number;
  readonly above: number;
  readonly strongest: number;
  readonly noValue: number;
}

function counts({ coherence, judged, level }: CoherenceFacts): Counts {
  let [bins, above, strongest, noValue] = [0, 0, -1, 0];
  for (let k = judged[0]; k < judged[1]; k++) {
    const v = coherence[k];
    if (Number.isNaN(v)) {
      noValue++;
      continue;
    }
    bins++;
    if (v > level) above++;
    if (strongest < 0 || v > coherence[strongest]) strongest = k;
  }
  return { bins, above, strongest, noValue };
}

export function coherenceNumbers(f: CoherenceFacts): Quantity[] {
  const { bins, above, strongest } = counts(f);
  const p = f.falseProbability;
  const formula = { formula: '1 − p^{1/(n−1)}', source: LEVEL_SOURCE };
  const interval = strongest < 0 ? [0, 0] : coherenceInterval(f.coherence[strongest], f.averages, 1.645);
  return [
    { id: 'segments', label: 'Segments', value: f.segments, unit: '', convention: 'valid in both' },
    {
      id: 'averages',
      label: 'Effective averages',
      value: f.averages,
      unit: '',
      convention: 'n, independent segments with the same scatter',
      explain: {
        formula: '1/n = (1/K)[1 + 2 Σ (1 − j/K) ρ_j]',
        source: 'Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967)',
      },
    },
    {
      id: 'floor',
      label: 'Coherence expected of nothing',
      value: 1 / f.averages,
      unit: '',
      convention: 'mean of a bin, magnitude squared',
      explain: { formula: '1/n', source: LEVEL_SOURCE },
    },
    {
      id: 'level',
      label: 'Level of one bin',
      value: f.level,
      unit: '',
      convention: `exceeded by chance with probability ${numberText(p)} in each bin`,
      explain: formula,
    },
    {
      id: 'above',
      label: 'Bins above the level',
      value: above,
      unit: '',
      convention: `of ${bins}; ${numberText(p * bins)} expected by chance`,
    },
    {
      id: 'search-level',
      label: 'Level of all bins',
      value: f.searchLevel,
      unit: '',
      convention: `exceeded by chance with probability at most ${numberText(p)} anywhere in ${bins} bins`,
      explain: { formula: '1 − (p/bins)^{1/(n−1)}', source: LEVEL_SOURCE },
    },
    {
      id: 'ranges',
      label: 'Coherent ranges',
      value: f.ranges.length,
      unit: '',
      convention: 'above the level of all bins',
    },
    ...(strongest < 0
      ? []
      : [
          {
            id: 'strongest',
            label: `Strongest, at ${numberText(f.frequency[strongest], 6)} Hz`,
            value: f.coherence[strongest],
            unit: '',
            convention: 'magnitude squared',
            low: interval[0],
            high: interval[1],
            intervalMeaning: '90 % for the true coherence of that bin, were it not chosen as the strongest',
          },
          {
            id: 'strongest-at',
            label: 'Frequency of the strongest',
            value: f.frequency[strongest],
            unit: 'Hz',
          },
        ]),
  ];
}

export function coherenceTable(f: CoherenceFacts): Table {
  return {
    kind: 'table',
    id: 'ranges',
    title: `Ranges in which ${f.names[0]} and ${f.names[1]} are coherent`,
    columns: [
      { id: 'from', label: 'From', unit: 'Hz' },
      { id: 'to', label: 'To', unit: 'Hz' },
      { id: 'at', label: 'Strongest at', unit: 'Hz' },
      { id: 'coherence', label: 'Coherence', unit: '' },
      { id: 'phase', label: 'Phase, positive where the second lags', unit: '°' },
    ],
    rows: f.ranges.map((r) => [r.from, r.to, r.at, r.value, f.phase[r.bin]]),
  };
}

export function coherenceWarnings(f: CoherenceFacts): Warning[] {
  const { bins, noValue, above } = counts(f);
  const out: Warning[] = [];
  if (f.averages < FEW)
    out.push({
      code: 'few-averages',
      severity: 'caution',
      found: `only ${counted(f.segments, 'segment')} averaged, as good as ${numberText(f.averages, 3)} independent ones`,
      value: f.averages,
      consequence: `Two channels with nothing in common reach ${numberText(f.level, 3)} in one bin of ${numberText(1 / f.falseProbability, 3)}; weaker coherence cannot be seen.`,
      remedy: 'Use shorter segments or a longer span.',
    });
  if (noValue > 0)
    out.push({
      code: 'zero-bins',
      severity: 'caution',
      found: `${counted(noValue, 'bin')} of ${bins + noValue} without power in one of the channels`,
      value: noValue,
      consequence: 'There is no coherence for them; they are not drawn and not counted.',
      remedy: 'Check the channels: they may be constant, or filtered to nothing there.',
    });
  if (bins > 0 && f.coherence.subarray(...f.judged).every((v) => Number.isNaN(v) || v > 1 - 1e-9))
    out.push({
      code: 'same-data',
      severity: 'problem',
      found: 'coherence is 1 in every bin',
      value: 1,
      consequence:
        'The two series are the same data, perhaps scaled or filtered; this says nothing about two instruments.',
      remedy: 'Choose two different channels.',
    });
  else if (above > 0.5 * bins)
    out.push({
      code: 'coherent-broadband',
      severity: 'note',
      found: `${numberText((100 * above) / bins, 3)} % of the bins lie above the level of one bin`,
      value: above / bins,
      consequence: 'The channels share a broad source, or one was made from the other.',
      remedy: 'If they should be independent, look for a common transient with shorter spans.',
    });
  if (Math.abs(f.fraction) > 0.01)
    out.push({
      code: 'sampling-offset',
      severity: 'note',
      found: `the samples of ${f.names[1]} were taken ${withUnit(f.fraction, 'sample', 3)} away from those of ${f.names[0]}`,
      value: f.fraction,
      consequence:
        'The coherence is not affected; the phase turns by up to that share of 180° towards half the sample rate.',
      remedy: 'Resample one of them when the phase matters.',
    });
  return out;
}
