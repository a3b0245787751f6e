import type { NoiseLine } from '../data/kinds';
import type { Quantity, Warning } from '../data/quantity';
import type { Table } from '../data/table';
import { counted, numberText, withUnit } from '../figures/number-text';
import type { Family } from './line-families';

/** Fewer independent averages than this let only strong lines stand out. */
const FEW = 16;
/** Part of the searched bins taken by lines from which the floor is doubtful. */
const CROWDED = 0.25;

export interface LineFacts {
  readonly lines: readonly NoiseLine[];
  readonly families: readonly Family[];
  /** Largest change of frequency and density over the parts, per line. */
  readonly wander: readonly number[];
  readonly heights: readonly number[];
  readonly threshold: number;
  readonly falseAlarms: number;
  readonly bins: number;
  readonly band: readonly [number, number];
  readonly averages: number;
  readonly taken: number;
  readonly df: number;
  readonly segmentSeconds: number;
  readonly parts: number;
  readonly unit: string;
}

const familyText = (line: NoiseLine): string =>
  line.family ? `${line.family.harmonic} × ${numberText(line.family.fundamental, 6)} Hz` : '';

export function linesNumbers(f: LineFacts): Quantity[] {
  const strongest = f.lines.reduce<NoiseLine | undefined>(
    (b, l) => (b && b.height >= l.height ? b : l),
    undefined,
  );
  return [
    {
      id: 'lines',
      label: 'Lines',
      value: f.lines.length,
      unit: '',
      convention: `from ${numberText(f.band[0])} to ${numberText(f.band[1])} Hz`,
    },
    ...(strongest
      ? [
          {
            id: 'strongest',
            label: 'Strongest line',
            value: strongest.frequency,
            unit: 'Hz',
            low: strongest.frequency - strongest.frequencyError,
            high: strongest.frequency + strongest.frequencyError,
            intervalMeaning: 'one standard error',
          },
          {
            id: 'strongest-height',
            label: 'Its height',
            value: strongest.height,
            unit: '',
            convention: 'peak power density over the local floor',
          },
          {
            id: 'strongest-power',
            label: 'Its power',
            value: strongest.power,
            unit: f.unit,
            convention: 'density less floor, summed over three widths on each side',
          },
        ]
      : []),
    {
      id: 'unresolved',
      label: 'Narrower than the window',
      value: f.lines.filter((l) => l.unresolved).length,
      unit: '',
    },
    { id: 'families', label: 'Harmonic families', value: f.families.length, unit: '' },
    {
      id: 'drifting',
      label: 'Drifting lines',
      value: f.lines.filter((l) => l.stability === 'drifting').length,
      unit: '',
    },
    {
      id: 'threshold',
      label: 'Threshold',
      value: f.threshold,
      unit: '',
      convention: 'power density over the local floor',
      explain: {
        formula:
          'value that one bin of Gaussian noise over its floor exceeds with probability false-alarms / bins',
        source: 'law of the averaged estimate; computed',
      },
    },
    {
      id: 'false-alarms',
      label: 'False lines expected at most',
      value: f.falseAlarms,
      unit: '',
      convention: 'mean number in Gaussian noise of the same length',
    },
    { id: 'bins', label: 'Bins searched', value: f.bins, unit: '' },
  ];
}

export function linesTables(f: LineFacts): Table[] {
  const column = (id: string, label: string, unit = ''): { id: string; label: string; unit: string } => ({
    id,
    label,
    unit,
  });
  return [
    {
      kind: 'table',
      id: 'lines',
      title: 'Lines',
      columns: [
        column('frequency', 'Frequency', 'Hz'),
        column('error', 'Standard error', 'Hz'),
        column('width', 'Full width at half height', 'Hz'),
        column('resolved', 'Width is'),
        column('q', 'Q'),
        column('height', 'Height over floor'),
        column('power', 'Power', f.unit),
        column('family', 'Multiple of'),
        column('stability', 'Over time'),
        column('wander', 'Frequency moves by', 'Hz'),
        column('heights', 'Density changes by a factor'),
      ],
      rows: f.lines.map((l, i) => [
        l.frequency,
        l.frequencyError,
        l.width,
        l.unresolved ? 'upper limit' : 'measured',
        l.q,
        l.height,
        l.power,
        familyText(l),
        l.stability,
        Number.isNaN(f.wander[i]) ? null : f.wander[i],
        Number.isNaN(f.heights[i]) ? null : f.heights[i],
      ]),
    },
    {
      kind: 'table',
      id: 'families',
      title: 'Harmonic families',
      columns: [
        column('fundamental', 'Fundamental', 'Hz'),
        column('lines', 'Lines'),
        column('harmonics', 'Multiples'),
        column('chance', 'Probability by coincidence'),
      ],
      rows: f.families.map((g) => [
        g.fundamental,
        g.members.length,
        g.members.map((m) => m.harmonic).join(', '),
        g.chance,
      ]),
    },
  ];
}

export function linesWarnings(f: LineFacts): Warning[] {
  const out: Warning[] = [];
  const narrow = f.lines.filter((l) => l.unresolved).length;
  if (narrow > 0)
    out.push({
      code: 'unresolved-lines',
      severity: 'note',
      found: `${counted(narrow, 'line')} narrower than the resolution`,
      value: narrow,
      consequence: 'Only an upper limit of the width and a lower limit of Q are known.',
      remedy: `Lengthen "segment"${f.averages > 4 * FEW ? `, to ${numberText(4 * f.segmentSeconds)} s for instance` : ' and take more data'}.`,
    });
  const drifting = f.lines.flatMap((l, i) => (l.stability === 'drifting' ? [{ l, i }] : []));
  if (drifting.length > 0) {
    const { l, i } = drifting.reduce((a, b) => (a.l.height >= b.l.height ? a : b));
    out.push({
      code: 'drifting-lines',
      severity: 'caution',
      found: `${counted(drifting.length, 'line')} not the same over the time, the strongest at ${withUnit(l.frequency, 'Hz', 6)}: frequency within ${withUnit(f.wander[i], 'Hz', 3)}, density within a factor ${numberText(f.heights[i], 3)}`,
      value: drifting.length,
      consequence: 'A notch of fixed frequency leaves part of it; its width here is that of the wandering.',
      remedy: 'Treat shorter spans on their own, or make the notch wider.',
    });
  }
  if (f.averages < FEW)
    out.push({
      code: 'few-averages',
      severity: 'caution',
      found: `only ${numberText(f.averages, 3)} independent averages: lines must stand ${numberText(f.threshold, 3)} times above the floor`,
      value: f.averages,
      consequence: 'Weaker lines are missed.',
      remedy: `Shorten "segment" to ${numberText(f.segmentSeconds / 4)} s or take more data.`,
    });
  if (f.taken > CROWDED)
    out.push({
      code: 'crowded-floor',
      severity: 'caution',
      found: `lines take ${numberText(100 * f.taken, 2)} % of the searched bins`,
      value: f.taken,
      consequence: 'The floor between them is uncertain, and lines may have merged.',
      remedy: 'Lengthen "segment" or narrow "floor-width".',
    });
  if (f.parts < 2)
    out.push({
      code: 'stability-not-tested',
      severity: 'note',
      found: `too few segments of ${numberText(f.segmentSeconds)} s to compare parts of the time`,
      consequence: 'Whether the lines are steady is not known.',
      remedy: 'Take more data or shorten "segment".',
    });
  return out;
}
