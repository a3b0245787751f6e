import { DASHES, fillOf, markStyle, strokeOf, type ThemeKind } from '../colours';
import type { Figure, Mark, Trace } from '../figure';
import { imageUrl } from '../image';
import type { Placed } from './place';

export interface Frame {
  readonly x: Placed;
  readonly y: Placed;
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
  readonly kind: ThemeKind;
}

/** A coordinate with a hundredth of a pixel: enough for print, and the same text on every machine. */
export const px = (v: number): string => String(Math.round(v * 100) / 100);

/** Traces as SVG elements, those further back first. */
export const traces = (figure: Figure, frame: Frame): string =>
  figure.traces.map((t) => trace(t, frame)).join('');

export const marks = (figure: Figure, frame: Frame): string =>
  figure.marks.map((m) => mark(m, frame)).join('');

function trace(t: Trace, frame: Frame): string {
  const { colour, width, dash } = strokeOf(t.role, frame.kind);
  switch (t.type) {
    case 'line': {
      const d = runs(t.x, t.y, frame).map((run) => `M${run.join('L')}`);
      return `<path d="${d.join('')}" fill="none" stroke="${colour}" stroke-width="${width}" stroke-dasharray="${DASHES[dash]}" stroke-linejoin="round"/>`;
    }
    case 'range': {
      const d = runs(t.x, t.high, frame, t.low).map((run) => `M${run.join('L')}Z`);
      return `<path d="${d.join('')}" fill="${fillOf(t.role, frame.kind)}" stroke="none"/>`;
    }
    case 'points': {
      const rings = Array.from(t.x, (v, i) => {
        const [cx, cy] = [frame.x.at(v), frame.y.at(t.y[i])];
        return Number.isFinite(cx) && Number.isFinite(cy)
          ? `<circle cx="${px(cx)}" cy="${px(cy)}" r="6"/>`
          : '';
      });
      return `<g fill="none" stroke="${colour}" stroke-width="2">${rings.join('')}</g>`;
    }
    case 'image': {
      const [a, b] = [frame.x.at(t.x[0]), frame.x.at(t.x[1])];
      const [bottom, top] = [frame.y.at(t.y[0]), frame.y.at(t.y[1])];
      return `<image href="${imageUrl(t, frame.kind)}" x="${px(a)}" y="${px(top)}" width="${px(b - a)}" height="${px(bottom - top)}" preserveAspectRatio="none" image-rendering="pixelated"/>`;
    }
    case 'bars': {
      const floor = frame.y.at(Math.max(0, frame.y.range[0]));
      const rects = Array.from(t.counts, (c, i) => {
        const [a, b] = [frame.x.at(t.edges[i]), frame.x.at(t.edges[i + 1])];
        const top = frame.y.at(c);
        return c > 0 && Number.isFinite(top)
          ? `M${px(a)} ${px(floor)}V${px(top)}H${px(b)}V${px(floor)}Z`
          : '';
      });
      return `<path d="${rects.join('')}" fill="${fillOf(t.role, frame.kind)}" stroke="none"/>`;
    }
  }
}

/** Unbroken stretches as lists of points; with `back`, closed by the way back along it. */
function runs(x: Float64Array, y: Float64Array, frame: Frame, back?: Float64Array): string[][] {
  const out: string[][] = [];
  const good = (i: number): boolean => {
    const finite = (v: number): boolean => Number.isFinite(frame.y.at(v));
    return Number.isFinite(frame.x.at(x[i])) && finite(y[i]) && (back === undefined || finite(back[i]));
  };
  const point = (i: number, v: number): string =>
    `${px(frame.x.at(x[i]))} ${px(clamp(frame.y.at(v), frame))}`;
  for (let i = 0; i < x.length; i++) {
    if (!good(i)) continue;
    const run: string[] = [];
    const first = i;
    for (; i < x.length && good(i); i++) run.push(point(i, y[i]));
    if (back) for (let k = i - 1; k >= first; k--) run.push(point(k, back[k]));
    if (run.length === 1) run.push(run[0]);
    out.push(run);
  }
  return out;
}

/** Values far outside of the frame are cut by it anyway; their coordinates stay small. */
const clamp = (v: number, { top, bottom }: Frame): number => Math.max(top - 2000, Math.min(bottom + 2000, v));

function mark(m: Mark, { x, left, right, top, bottom, kind }: Frame): string {
  const { colour, width, dash, fill } = markStyle(m.role, kind);
  const a = Math.max(left, Math.min(right, x.at(m.from)));
  const b = Math.max(left, Math.min(right, x.at(m.to)));
  if (!(b >= a)) return '';
  const line = `stroke="${colour}" stroke-width="${width}" stroke-dasharray="${DASHES[dash]}"`;
  return m.from === m.to
    ? `<path d="M${px(a)} ${px(top)}V${px(bottom)}" ${line}/>`
    : `<rect x="${px(a)}" y="${px(top)}" width="${px(Math.max(0.5, b - a))}" height="${px(bottom - top)}" fill="${fill}" ${line}/>`;
}
