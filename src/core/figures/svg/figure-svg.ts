import { DASHES, fillOf, markStyle, strokeOf, type ThemeKind } from '../colours';
import type { Axis, Figure } from '../figure';
import { marks, px, traces, type Frame } from './draw';
import { placed } from './place';

export type PictureStyle = 'print' | 'light' | 'dark';

export interface PictureOptions {
  readonly width: number;
  readonly height: number;
  readonly style: PictureStyle;
  /** Without title, legend and axis titles: for a thumbnail. */
  readonly bare?: boolean;
}

interface Paper {
  readonly kind: ThemeKind;
  readonly ground: string;
  readonly text: string;
  readonly grid: string;
}

const PAPERS: Readonly<Record<PictureStyle, Paper>> = {
  print: { kind: 'contrast-light', ground: '#ffffff', text: '#000000', grid: '#d4d4d4' },
  light: { kind: 'light', ground: '#ffffff', text: '#242424', grid: '#e2e2e2' },
  dark: { kind: 'dark', ground: '#1b1d21', text: '#d6d9de', grid: '#3a3e46' },
};
const FONT = 'system-ui, sans-serif';

/** Text that cannot end or open an element: names in data files are not ours. */
const plain = (text: string): string =>
  text.replace(/[&<>"']/g, (c) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' })[c] ?? '&#39;');

/** A figure as a stand-alone SVG document, made without browser or fonts: the same figure gives the same text. */
export function figureSvg(figure: Figure, { width, height, style, bare = false }: PictureOptions): string {
  const paper = PAPERS[style];
  const size = bare ? 9 : 12;
  const keys = bare ? { height: 0, svg: '' } : legend(figure, paper, width);
  const left = bare ? 58 : 84;
  const right = width - 16;
  const top = bare ? 6 : 34 + keys.height;
  const bottom = height - (bare ? 16 : 48);
  const x = placed(
    figure.x,
    figure.x.range ?? figure.x.extent,
    left,
    right,
    Math.max(3, Math.floor((right - left) / 90)),
  );
  const y = placed(
    figure.y,
    figure.y.range ?? roomy(figure.y),
    bottom,
    top,
    Math.max(3, Math.floor((bottom - top) / 40)),
  );
  const frame: Frame = { x, y, left, top, right, bottom, kind: paper.kind };
  const label = (text: string, at: string, anchor: string): string =>
    `<text ${at} text-anchor="${anchor}">${plain(text)}</text>`;
  const titled = (a: Axis): string => (a.unit === '' ? a.label : `${a.label} [${a.unit}]`);
  const grid = [
    ...x.ticks.map((t) => `M${px(t.at)} ${px(top)}V${px(bottom)}`),
    ...y.ticks.map((t) => `M${px(left)} ${px(t.at)}H${px(right)}`),
  ].join('');
  const ticks = [
    ...x.minor.map((v) => `M${px(v)} ${px(bottom)}v2`),
    ...y.minor.map((v) => `M${px(left)} ${px(v)}h-2`),
    ...x.ticks.map((t) => `M${px(t.at)} ${px(bottom)}v4`),
    ...y.ticks.map((t) => `M${px(left)} ${px(t.at)}h-4`),
  ].join('');
  const parts = [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}" role="img" font-family="${FONT}" font-size="${size}" fill="${paper.text}">`,
    `<title>${plain(figure.title)}</title><desc>${plain(figure.caption)}</desc>`,
    `<rect width="100%" height="100%" fill="${paper.ground}"/>`,
    `<clipPath id="frame"><rect x="${px(left)}" y="${px(top)}" width="${px(right - left)}" height="${px(bottom - top)}"/></clipPath>`,
    `<path d="${grid}" stroke="${paper.grid}" fill="none"/>`,
    `<g clip-path="url(#frame)">${marks(figure, frame)}${traces(figure, frame)}</g>`,
    `<path d="M${px(left)} ${px(top)}H${px(right)}V${px(bottom)}H${px(left)}Z${ticks}" stroke="${paper.text}" fill="none"/>`,
    ...x.ticks.map((t) => label(t.label, `x="${px(t.at)}" y="${px(bottom + size + 4)}"`, 'middle')),
    ...y.ticks.map((t) => label(t.label, `x="${px(left - 7)}" y="${px(t.at + size * 0.35)}"`, 'end')),
  ];
  if (!bare)
    parts.push(
      `<text x="${px(left)}" y="20" font-size="15" font-weight="600">${plain(figure.title)}</text>`,
      keys.svg,
      label(titled(figure.x), `x="${px((left + right) / 2)}" y="${px(height - 10)}"`, 'middle'),
      `<text transform="translate(16 ${px((top + bottom) / 2)}) rotate(-90)" text-anchor="middle">${plain(titled(figure.y))}</text>`,
    );
  return `${parts.join('\n')}\n</svg>\n`;
}

/** The extent of a value axis with a little room at both ends. */
function roomy(axis: Axis): readonly [number, number] {
  const [a, b] = axis.extent;
  if (axis.scale === 'log') return a > 0 && b > a ? [a * (a / b) ** 0.04, b * (b / a) ** 0.04] : [a, b];
  const room = 0.04 * (b - a);
  return [a - room, b + room];
}

/** Names of the traces and marks in rows above the frame, as wide as the text is likely to be. */
function legend(figure: Figure, { kind, text }: Paper, width: number): { height: number; svg: string } {
  const entries = [
    ...figure.traces.map((t) => {
      const { colour, dash } = strokeOf(t.role, kind);
      const line = `stroke="${colour}" stroke-width="2" stroke-dasharray="${DASHES[dash]}"`;
      return {
        name: t.name,
        key: t.type === 'line' ? line : `stroke="${fillOf(t.role, kind)}" stroke-width="8"`,
      };
    }),
    ...[...new Set(figure.marks.map((m) => m.role))].map((role) => {
      const { fill, colour } = markStyle(role, kind);
      return { name: role, key: `stroke="${fill === '' ? colour : fill}" stroke-width="8"` };
    }),
  ];
  let x = 84;
  let row = 0;
  const svg = entries.map(({ name, key }) => {
    const need = 40 + 6.4 * name.length;
    if (x > 84 && x + need > width - 16) {
      x = 84;
      row += 1;
    }
    const y = 36 + 16 * row;
    const out = `<path d="M${px(x)} ${y - 4}h22" ${key}/><text x="${px(x + 28)}" y="${y}" fill="${text}">${plain(name)}</text>`;
    x += need;
    return out;
  });
  return { height: entries.length === 0 ? 0 : 16 * (row + 1), svg: svg.join('') };
}
