import { addSeconds, formatGps, type GpsTime } from '../data/gps-time';
import type { Quantity, Warning } from '../data/quantity';
import type { Table } from '../data/table';
import { counted, numberText, withUnit } from '../figures/number-text';
import type { Steadiness } from './stationarity-test';

export interface StationarityFacts {
  readonly found: readonly Steadiness[];
  readonly strideSeconds: number;
  readonly strides: number;
  readonly empty: number;
  readonly start: GpsTime;
}

/** Probability by chance below which a movement is reported. */
const UNLIKELY = 1e-3;
const FEW = 8;

export function stationarityNumbers({ found, strides, empty, strideSeconds }: StationarityFacts): Quantity[] {
  return [
    {
      id: 'strides',
      label: 'Strides',
      value: strides - empty,
      unit: '',
      convention: `of ${withUnit(strideSeconds, 's')}, with a value`,
    },
    ...found.flatMap((f, i): Quantity[] => [
      {
        id: `expected-${i + 1}`,
        label: `Expected scatter, ${f.trend.label}`,
        value: 100 * f.trend.expected,
        unit: '%',
        convention:
          'standard deviation of a stride in steady Gaussian noise, from window, overlap and spectrum',
      },
      {
        id: `excess-${i + 1}`,
        label: `Scatter, ${f.trend.label}`,
        value: f.excess,
        unit: '',
        convention: 'over the expected one: 1 in steady noise',
      },
      {
        id: `p-value-${i + 1}`,
        label: `Chance of that, ${f.trend.label}`,
        value: f.pValue,
        unit: '',
        convention: `χ² of ${f.strides - 1} degrees of freedom at least as large`,
      },
    ]),
  ];
}

export function stationarityTable({ found, strideSeconds, start }: StationarityFacts): Table {
  return {
    kind: 'table',
    id: 'bands',
    title: 'What moved',
    columns: [
      { id: 'what', label: 'What', unit: '' },
      { id: 'scatter', label: 'Scatter over expected', unit: '' },
      { id: 'chance', label: 'Chance', unit: '' },
      { id: 'furthest', label: 'Furthest stride at GPS', unit: 's' },
      { id: 'value', label: 'Its value over the median', unit: '' },
      { id: 'sigmas', label: 'Off by', unit: 'σ' },
      { id: 'chance-furthest', label: 'Chance among all strides', unit: '' },
    ],
    rows: found.map((f) => [
      f.trend.label,
      f.excess,
      f.pValue,
      formatGps(addSeconds(start, f.furthest * strideSeconds)),
      f.trend.values[f.furthest],
      f.sigmas,
      f.furthestPValue,
    ]),
  };
}

export function stationarityWarnings(facts: StationarityFacts): Warning[] {
  const { found, strideSeconds, start, strides, empty } = facts;
  const out: Warning[] = [];
  const jumps = found.filter((f) => f.furthestPValue < UNLIKELY);
  const worst = jumps.reduce<Steadiness | undefined>(
    (a, b) => (a && Math.abs(a.sigmas) >= Math.abs(b.sigmas) ? a : b),
    undefined,
  );
  if (worst) {
    const at = worst.furthest * strideSeconds;
    out.push({
      code: 'excursion',
      severity: 'caution',
      found: `${worst.trend.label} is ${numberText(worst.trend.values[worst.furthest], 3)} times its median in the stride at GPS ${formatGps(addSeconds(start, at))}, ${numberText(Math.abs(worst.sigmas), 3)} σ off`,
      value: worst.sigmas,
      consequence:
        'The noise there is not that of the rest: a spectrum of the whole is wrong for it, and candidates in it are judged by the wrong noise.',
      remedy: `Look at it in a map; leave out ${numberText(at)} to ${numberText(at + strideSeconds)} s.`,
      fix: { kind: 'set', label: 'Leave it out here', params: { exclude: [at, at + strideSeconds] } },
    });
  }
  const drifts = found.filter((f) => f.pValue < UNLIKELY && f.furthestPValue >= UNLIKELY);
  const first = drifts.at(0);
  if (first)
    out.push({
      code: 'drift',
      severity: 'caution',
      found: `${first.trend.label} scatters ${numberText(first.excess, 3)} times as much as steady noise would`,
      value: first.excess,
      consequence: 'Errors of averaged spectra are larger than stated, and SNR wanders with the noise.',
      remedy: 'Use a noise spectrum of the time close to what is judged.',
    });
  if (strides - empty < FEW)
    out.push({
      code: 'few-strides',
      severity: 'note',
      found: `${counted(strides - empty, 'stride')} with a value`,
      value: strides - empty,
      consequence: 'Slow changes cannot be told from chance.',
      remedy: 'Take a longer span or a shorter "stride".',
    });
  if (empty > 0)
    out.push({
      code: 'empty-strides',
      severity: 'note',
      found: `${counted(empty, 'stride')} of ${strides} with less than half valid data`,
      value: empty,
      consequence: 'They have no value; the lines break there.',
      remedy: 'Nothing to do if the gaps are known.',
    });
  return out;
}
