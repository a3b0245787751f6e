import { addSeconds, formatGps, secondsBetween, utcText, type GpsTime } from '../data/gps-time';
import type { SnrSeries } from '../data/kinds';
import type { Quantity } from '../data/quantity';
import { spanLength } from '../data/spans';
import type { Table } from '../data/table';
import { chanceOf, expectedLoudest, RAYLEIGH_HIGH, RAYLEIGH_MEDIAN, type RayleighFacts } from './peaks';

/** GPS time of a fractional sample of a series that starts at `start`, to a microsecond. */
export const timeOf = (snr: Pick<SnrSeries, 'start' | 'rate'>, at: number): GpsTime =>
  addSeconds(snr.start, Math.round((at / snr.rate) * 1e6) / 1e6);

const turns = (phase: number): number => (phase * 180) / Math.PI;

/** Mpc at which the template, face on and straight above, would be as loud as found. */
export const effectiveDistance = (snr: SnrSeries, ratio: number): number | undefined =>
  snr.template.distance === undefined ? undefined : (snr.template.distance * snr.template.sigma) / ratio;

export interface FilterFacts {
  readonly snr: SnrSeries;
  readonly rayleigh: RayleighFacts;
  readonly variance: number;
}

/** Seconds of valid values. */
const validSeconds = (snr: SnrSeries): number => spanLength(snr.valid) / snr.rate;

/** The level that |SNR| is expected to reach once by noise alone. */
export const noiseLevel = (snr: SnrSeries): number => expectedLoudest(validSeconds(snr), snr.filter.spread);

export function filterNumbers(facts: FilterFacts): Quantity[] {
  const { snr, rayleigh } = facts;
  const loudest = snr.peaks.at(0);
  const at = loudest && timeOf(snr, loudest.at);
  const distance = loudest && effectiveDistance(snr, loudest.snr);
  return [
    ...(loudest && at
      ? [
          {
            id: 'snr',
            label: 'Loudest |SNR|',
            value: loudest.snr,
            unit: '',
            convention: 'modulus over both phases, parabola through three samples',
            explain: {
              formula: 'z(t) = 4 ∫ s̃ h̃* e^(2πift)/S df, σ² = 4 ∫ |h̃|²/S df, |SNR| = |z|/σ',
              source: 'Allen et al., Phys. Rev. D 85, 122006 (2012), MEMORY',
            },
          },
          {
            id: 'time',
            label: 'Its time after the start',
            value: secondsBetween(at, snr.start),
            unit: 's',
            convention:
              snr.startUnknown === true
                ? `of its ${snr.template.origin}; the file does not say when it starts`
                : `of its ${snr.template.origin}: GPS ${formatGps(at)}, ${utcText(at)}`,
          },
          {
            id: 'phase',
            label: 'Its phase',
            value: turns(loudest.phase),
            unit: '°',
            convention: 'angle the template h̃(f), f > 0, is turned by (e^(iφ)) to match the data',
          },
          ...(distance === undefined
            ? [
                {
                  id: 'amplitude',
                  label: 'Its amplitude',
                  value: loudest.snr / snr.template.sigma,
                  unit: '',
                  convention: "in units of the template's own",
                },
              ]
            : [
                {
                  id: 'effective-distance',
                  label: 'Its effective distance',
                  value: distance,
                  unit: 'Mpc',
                  convention:
                    'distance at which the template, best placed and oriented, is as loud: D σ/|SNR|',
                },
              ]),
          {
            id: 'chance',
            label: 'Chance of one as loud',
            value: chanceOf(loudest.snr, validSeconds(snr), snr.filter.spread),
            unit: '',
            convention:
              'at least once in this much Gaussian noise, this one template: 1 − exp(−n), n upward crossings of the level expected',
          },
        ]
      : []),
    {
      id: 'sigma',
      label: 'σ of the template',
      value: snr.template.sigma,
      unit: '',
      convention:
        snr.template.distance === undefined
          ? 'optimal SNR at its own amplitude'
          : `optimal SNR at ${snr.template.distance} Mpc, best placed and oriented`,
    },
    {
      id: 'independent',
      label: 'Independent values',
      value: validSeconds(snr) * snr.filter.bandwidth,
      unit: '',
      convention: `valid time times the noise bandwidth (Σw)²/Σw² Δf, w = |h̃|²/S`,
    },
    {
      id: 'expected-loudest',
      label: 'Expected loudest in noise',
      value: noiseLevel(snr),
      unit: '',
      convention: 'level crossed upwards once in this much Gaussian noise',
      explain: {
        formula: 'T √(2π) B ρ e^(−ρ²/2) = 1, B the root mean square of f about its mean under |h̃|²/S',
        source: 'Rice, Bell Syst. Tech. J. 24, 46 (1945), MEMORY',
      },
    },
    {
      id: 'median',
      label: 'Median |SNR|',
      value: rayleigh.median,
      unit: '',
      convention: `Rayleigh: ${RAYLEIGH_MEDIAN.toFixed(4)}`,
    },
    { id: 'rms', label: 'Root mean square', value: rayleigh.rms, unit: '', convention: 'Rayleigh: √2' },
    {
      id: 'above',
      label: `Share above ${RAYLEIGH_HIGH.toFixed(3)}`,
      value: rayleigh.above,
      unit: '',
      convention: 'Rayleigh: 0.05',
    },
    {
      id: 'variance',
      label: 'Variance by the spectrum',
      value: facts.variance,
      unit: '',
      convention: 'of each phase in noise of the spectrum used; 1 but for the limited reach of 1/S',
    },
    {
      id: 'valid',
      label: 'Valid time',
      value: validSeconds(snr),
      unit: 's',
      convention: 'edges dropped',
    },
  ];
}

export function peakTable(snr: SnrSeries): Table {
  const far = snr.template.distance !== undefined;
  return {
    kind: 'table',
    id: 'peaks',
    title: 'Loudest peaks',
    columns: [
      { id: 'rank', label: 'Rank', unit: '' },
      { id: 'gps', label: 'GPS time', unit: 's' },
      { id: 'utc', label: 'UTC', unit: '' },
      { id: 'after', label: 'After the start', unit: 's' },
      { id: 'snr', label: '|SNR|', unit: '' },
      { id: 'phase', label: 'Phase', unit: '°' },
      far
        ? { id: 'distance', label: 'Effective distance', unit: 'Mpc' }
        : { id: 'amplitude', label: 'Amplitude over template', unit: '' },
    ],
    rows: snr.peaks.map((p, i) => {
      const t = timeOf(snr, p.at);
      return [
        i + 1,
        formatGps(t),
        snr.startUnknown === true ? 'unknown' : utcText(t),
        secondsBetween(t, snr.start),
        p.snr,
        turns(p.phase),
        effectiveDistance(snr, p.snr) ?? p.snr / snr.template.sigma,
      ];
    }),
  };
}
