import type { LineList } from '../data/kinds';
import type { Figure, Mark, Viewport } from './figure';
import { counted, numberText } from './number-text';
import { spectrumFigure } from './spectrum';

/** What the step adds to the data kind for its picture. */
export interface LineListDetail extends LineList {
  /** Factor on the floor that a line must exceed. */
  readonly threshold: number;
}

const hasThreshold = (data: LineList): data is LineListDetail => 'threshold' in data;

/** The spectrum with its floor and the threshold; each line is marked over its width and named. */
export function linesFigure(data: LineList, viewport: Viewport): Figure {
  const { spectrum, floor, lines } = data;
  // Without `estimate`: floor and threshold have no interval of their own.
  const { kind, frequency, df, unit, label } = spectrum;
  const bare = { kind, frequency, df, unit, label };
  const threshold = hasThreshold(data) ? data.threshold : undefined;
  return spectrumFigure(
    [
      { spectrum, role: 'data' },
      { spectrum: { ...bare, density: floor }, role: 'model', name: 'local floor' },
      ...(threshold === undefined
        ? []
        : [
            {
              spectrum: { ...bare, density: floor.map((v) => v * threshold) },
              role: 'reference' as const,
              name: 'threshold',
            },
          ]),
    ],
    viewport,
    {
      id: 'lines',
      title: 'Lines',
      note:
        lines.length === 0
          ? 'No line stands above the threshold.'
          : `${counted(lines.length, 'line')} marked over the full width at half height.`,
      marks: lines.map((l): Mark => {
        const half = Math.max(l.width, spectrum.df) / 2;
        const of = l.family ? `, ${l.family.harmonic} × ${numberText(l.family.fundamental, 5)} Hz` : '';
        const moving = l.stability === 'drifting' ? ', drifting' : '';
        return {
          role: 'event',
          from: l.frequency - half,
          to: l.frequency + half,
          label: `line at ${numberText(l.frequency, 6)} Hz, ${numberText(l.height, 3)} × floor${of}${moving}`,
        };
      }),
    },
  );
}
