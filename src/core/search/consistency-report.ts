import { formatGps, utcText } from '../data/gps-time';
import type { Consistency, ConsistentPeak } from '../data/kinds';
import type { Quantity, Warning } from '../data/quantity';
import type { Table } from '../data/table';
import { numberText } from '../figures/number-text';

/** Probability below which a peak is said not to look like the template. */
const UNLIKELY = 1e-3;

export function consistencyNumbers(peak: ConsistentPeak): Quantity[] {
  const at = `GPS ${formatGps(peak.time)}`;
  return [
    { id: 'snr', label: '|SNR|', value: peak.snr, unit: '', convention: `at ${at}` },
    {
      id: 'chi-squared',
      label: 'χ²',
      value: peak.chiSquared,
      unit: '',
      convention: `${peak.parts.length} bands, both phases`,
      explain: {
        formula: 'χ² = Σ |ρ_l − q_l ρ|²/q_l, q_l = σ_l²/σ² (1/p for p equal bands)',
        source: 'Allen, Phys. Rev. D 71, 062001 (2005), MEMORY',
      },
    },
    { id: 'freedom', label: 'Degrees of freedom', value: peak.freedom, unit: '', convention: '2p − 2' },
    {
      id: 'reduced',
      label: 'χ² per degree of freedom',
      value: peak.chiSquared / peak.freedom,
      unit: '',
      convention: '1 expected',
    },
    {
      id: 'p-value',
      label: 'Chance of a χ² as large',
      value: peak.pValue,
      unit: '',
      convention: 'Gaussian noise with a signal of exactly the template’s shape',
    },
    {
      id: 'reweighted',
      label: 'Re-weighted SNR',
      value: peak.reweighted,
      unit: '',
      convention: 'ρ/[(1 + (χ_r²)³)/2]^(1/6) where χ_r² > 1',
      explain: {
        formula: 'ρ/[(1 + (χ_r²)³)/2]^(1/6), χ_r² = χ²/(2p − 2)',
        source: 'Babak et al., Phys. Rev. D 87, 024033 (2013), MEMORY',
      },
    },
    {
      id: 'shape',
      label: 'Shape residual',
      value: peak.shape,
      unit: '',
      convention: 'Σ|ρ(t+τ) − ρ(t)R(τ)|² over its mean in Gaussian noise: 1 expected',
    },
    {
      id: 'shape-p-value',
      label: 'Chance of a residual as large',
      value: peak.shapePValue,
      unit: '',
      convention: 'gamma distribution of the same mean and variance',
    },
  ];
}

export function consistencyTable(peaks: readonly ConsistentPeak[], startUnknown: boolean): Table {
  return {
    kind: 'table',
    id: 'consistency',
    title: 'Consistency of the peaks',
    columns: [
      { id: 'gps', label: 'GPS time', unit: 's' },
      { id: 'utc', label: 'UTC', unit: '' },
      { id: 'snr', label: '|SNR|', unit: '' },
      { id: 'chi-squared', label: 'χ²', unit: '' },
      { id: 'freedom', label: 'Degrees of freedom', unit: '' },
      { id: 'reduced', label: 'χ² per degree', unit: '' },
      { id: 'p-value', label: 'Chance of such χ²', unit: '' },
      { id: 'reweighted', label: 'Re-weighted SNR', unit: '' },
      { id: 'shape', label: 'Shape residual', unit: '' },
      { id: 'shape-p-value', label: 'Chance of such residual', unit: '' },
    ],
    rows: peaks.map((p) => [
      formatGps(p.time),
      startUnknown ? 'unknown' : utcText(p.time),
      p.snr,
      p.chiSquared,
      p.freedom,
      p.chiSquared / p.freedom,
      p.pValue,
      p.reweighted,
      p.shape,
      p.shapePValue,
    ]),
  };
}

export function consistencyWarnings({ peaks }: Consistency): Warning[] {
  const odd = peaks.filter((p) => p.pValue < UNLIKELY || p.shapePValue < UNLIKELY);
  if (odd.length === 0) return [];
  const worst = odd.reduce((a, b) => (b.chiSquared > a.chiSquared ? b : a));
  return [
    {
      code: 'not-like-template',
      severity: 'caution',
      found:
        `${odd.length} of ${peaks.length} peaks do not look like the template; the one with the largest χ², at GPS ${formatGps(worst.time)}: ` +
        `|SNR| ${numberText(worst.snr)}, χ² ${numberText(worst.chiSquared)} for ${worst.freedom} degrees of freedom, re-weighted ${numberText(worst.reweighted)}`,
      value: worst.chiSquared / worst.freedom,
      consequence:
        'A disturbance of the instrument, or a signal the template fits poorly: the excess of a poor fit grows with the square of the SNR.',
      remedy:
        'Compare the re-weighted SNR; look at a time-frequency map of that time; try a template of other parameters.',
    },
  ];
}
