import { addSamples, formatGps } from '../data/gps-time';
import type { Series } from '../data/kinds';
import type { Quantity, Warning } from '../data/quantity';
import { intersectSpans, spanLength } from '../data/spans';
import type { Table } from '../data/table';
import { counted, numberText, withUnit } from '../figures/number-text';
import type { GateSearch } from './gate-search';
import type { Gate } from './gate-taper';

export interface GateFacts {
  readonly from: Series;
  readonly to: Series;
  readonly gates: readonly Gate[];
  /** Samples. */
  readonly taper: number;
  readonly touched: number;
  readonly lost: number;
  readonly outside: number;
  readonly rms: number;
  readonly threshold: number | null;
  readonly search: GateSearch | undefined;
  /** Whether the search had a band. */
  readonly band: boolean;
}

/** Shares of the valid data gated from which on it is worth a word, and from which on it is a problem. */
const MUCH = 0.05;
const MOST = 0.5;
/** Share of the valid data that the search may leave out. */
const UNSEARCHED = 0.2;

export const gatedShare = (f: GateFacts): number => f.touched / Math.max(1, spanLength(f.from.valid));
const lostShare = (f: GateFacts): number => f.lost / Math.max(1, spanLength(f.from.valid));

export function gateNumbers(f: GateFacts): Quantity[] {
  const { rate, unit } = f.to;
  const zero = spanLength(intersectSpans(f.gates, f.from.valid));
  const found: Quantity[] = f.search
    ? [
        { id: 'over', label: 'Samples over the threshold', value: f.search.over, unit: '' },
        {
          id: 'loudest',
          label: 'Loudest sample',
          value: f.search.loudest,
          unit: '',
          convention: 'robust widths from the median of what was tested',
        },
        {
          id: 'width',
          label: 'Robust width',
          value: f.search.width,
          unit,
          convention: '1.4826 times the median absolute deviation of what was tested',
        },
        { id: 'searched', label: 'Searched', value: f.search.tested / rate, unit: 's' },
        {
          id: 'chance',
          label: 'Expected by chance',
          value: f.search.chance,
          unit: '',
          convention: 'samples over the threshold in as much Gaussian noise',
        },
      ]
    : [];
  return [
    { id: 'gates', label: 'Gates', value: f.gates.length, unit: '' },
    {
      id: 'zero',
      label: 'At zero',
      value: zero / rate,
      unit: 's',
      convention: 'of valid data, tapers not counted',
    },
    {
      id: 'gated',
      label: 'Gated',
      value: f.touched / rate,
      unit: 's',
      convention: 'of valid data, with the tapers',
    },
    { id: 'share', label: 'Share gated', value: gatedShare(f), unit: '', convention: 'of the valid data' },
    {
      id: 'power-lost',
      label: 'Power lost',
      value: lostShare(f),
      unit: '',
      convention: 'by steady noise: mean of 1 − weight² over the valid data',
    },
    {
      id: 'rms',
      label: 'RMS after',
      value: f.rms,
      unit,
      convention: 'about zero, of the valid samples, gates included',
    },
    ...found,
  ];
}

export function gateTable({ to, gates, taper }: GateFacts): Table {
  return {
    kind: 'table',
    id: 'gates',
    title: 'Gates',
    columns: [
      { id: 'start', label: 'Zero from', unit: 'GPS' },
      { id: 'from', label: 'After the start', unit: 's' },
      { id: 'zero', label: 'At zero', unit: 's' },
      { id: 'gated', label: 'With tapers', unit: 's' },
      { id: 'why', label: 'Why', unit: '' },
      { id: 'loudest', label: 'Loudest', unit: 'widths' },
      { id: 'over', label: 'Samples over', unit: '' },
    ],
    rows: gates.map((g) => {
      const first = Math.max(0, g.from - taper);
      const last = Math.min(to.length, g.to + taper);
      return [
        formatGps(addSamples(to.start, g.from, to.rate)),
        g.from / to.rate,
        (g.to - g.from) / to.rate,
        (last - first) / to.rate,
        g.given ? (g.over > 0 ? 'given, found' : 'given') : 'found',
        g.over > 0 ? g.loudest : null,
        g.over,
      ];
    }),
  };
}

export function gateWarnings(f: GateFacts): Warning[] {
  return [...none(f), ...outside(f), ...much(f), ...click(f), ...chance(f), ...plain(f), ...unsearched(f)];
}

function none({ gates, threshold, search }: GateFacts): Warning[] {
  if (gates.length > 0) return [];
  return [
    {
      code: 'no-gate',
      severity: 'note',
      found: search
        ? `no sample is more than ${numberText(threshold!)} robust widths from the median; the loudest is ${numberText(search.loudest)}`
        : 'no span is given and no threshold is set',
      consequence: 'The step changes nothing.',
      remedy: search
        ? 'Lower "threshold", or look in another band.'
        : 'Give "spans" or "gps-spans", or set "threshold".',
    },
  ];
}

function outside({ outside: n, to }: GateFacts): Warning[] {
  if (n === 0) return [];
  return [
    {
      code: 'gate-outside',
      severity: 'caution',
      found: `${counted(n, 'given span lies', 'given spans lie')} outside of the data, which last ${withUnit(to.length / to.rate, 's', 9)} from GPS ${formatGps(to.start)}`,
      value: n,
      consequence: 'Nothing is gated there.',
      remedy: 'Give seconds after the start in "spans", GPS seconds in "gps-spans".',
    },
  ];
}

function much(f: GateFacts): Warning[] {
  const share = gatedShare(f);
  if (!(share > MUCH)) return [];
  const lost = lostShare(f);
  return [
    {
      code: 'gated-much',
      severity: share > MOST ? 'problem' : 'caution',
      found: `${numberText(100 * share, 3)} % of the valid data are gated`,
      value: share,
      consequence: `A mean spectrum of the result is too low by ${numberText(100 * lost, 2)} %, and ratios and ranges made with it too high by ${numberText(100 * (1 / Math.sqrt(1 - lost) - 1), 2)} %.`,
      remedy: 'Leave the gated spans out of the spectrum ("exclude"), use a median, or raise "threshold".',
    },
  ];
}

function click({ gates, taper, to }: GateFacts): Warning[] {
  if (gates.length === 0 || taper >= 8) return [];
  return [
    {
      code: 'no-taper',
      severity: 'caution',
      found: `the data are cut off within ${counted(taper, 'sample')}`,
      value: taper / to.rate,
      consequence:
        'The edges of each gate are clicks with power at all frequencies, the more the steeper the spectrum.',
      remedy: 'Raise "taper" to 0.25 s or more.',
      fix: { kind: 'set', label: 'Taper 0.25 s', params: { taper: 0.25 } },
    },
  ];
}

function chance({ search, threshold }: GateFacts): Warning[] {
  if (!search || !(search.chance >= 0.5)) return [];
  return [
    {
      code: 'threshold-low',
      severity: 'caution',
      found: `Gaussian noise alone puts ${numberText(search.chance, 3)} of ${search.tested} samples over ${numberText(threshold!)} robust widths`,
      value: search.chance,
      consequence: 'Good data are gated, and signals with them.',
      remedy: 'Raise "threshold" to 20 or more.',
      fix: { kind: 'set', label: 'Threshold 20', params: { threshold: 20 } },
    },
  ];
}

function plain({ search, band, from }: GateFacts): Warning[] {
  if (!search || band || from.unit === '') return [];
  return [
    {
      code: 'searched-as-is',
      severity: 'note',
      found: 'the samples were tested as they are, without a band',
      consequence: 'Where slow motion is far larger than all else a short transient does not stand out.',
      remedy:
        'Set "low" to look above the noise wall, or find the times in whitened data and give them as "spans".',
    },
  ];
}

function unsearched({ search, from }: GateFacts): Warning[] {
  if (!search) return [];
  const share = 1 - search.tested / spanLength(from.valid);
  if (!(share > UNSEARCHED)) return [];
  return [
    {
      code: 'not-searched',
      severity: 'caution',
      found: `${numberText(100 * share, 3)} % of the valid data lie within the reach of the band filter from a gap or an end`,
      value: share,
      consequence: 'Transients there are not found.',
      remedy: 'Raise "low", or give their spans.',
    },
  ];
}
