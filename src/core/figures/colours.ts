import type { Mark, TraceRole } from './figure';

export type ThemeKind = 'light' | 'dark' | 'contrast-light' | 'contrast-dark';

/** Dash patterns as SVG has them. */
export const DASHES: Readonly<Record<Stroke['dash'], string>> = {
  solid: 'none',
  dash: '6 3',
  dot: '1.5 3',
  dashdot: '6 3 1.5 3',
};

export interface Stroke {
  readonly colour: string;
  readonly width: number;
  readonly dash: 'solid' | 'dash' | 'dot' | 'dashdot';
}

/**
 * Colours of the figures by what a trace stands for. Chosen so that each keeps a contrast of at least 3 to the ground
 * of its theme and the roles stay apart in normal and in colour-deficient sight (test/webview/colours.test.ts
 * computes both); reference and model differ by their dashes too.
 */
const ROLES: Readonly<Record<ThemeKind, Readonly<Record<Exclude<TraceRole, 'interval'>, string>>>> = {
  light: { data: '#1a6fc4', second: '#cf5408', third: '#5c1550', reference: '#6a6a6a', model: '#1f7a55' },
  dark: { data: '#4d9df0', second: '#ea7f2e', third: '#e9c4ea', reference: '#a6a6a6', model: '#5fc99a' },
  'contrast-light': {
    data: '#0a4fb5',
    second: '#9c3800',
    third: '#451040',
    reference: '#292929',
    model: '#00583a',
  },
  'contrast-dark': {
    data: '#5a9dff',
    second: '#f5871f',
    third: '#efc9f2',
    reference: '#ffffff',
    model: '#66f0b0',
  },
};

const DASH: Readonly<Record<TraceRole, Stroke['dash']>> = {
  data: 'solid',
  second: 'solid',
  third: 'solid',
  reference: 'dot',
  model: 'dash',
  interval: 'solid',
};

const MARKS: Readonly<
  Record<Mark['role'], { readonly role: TraceRole; readonly fill: number; readonly dash: Stroke['dash'] }>
> = {
  gap: { role: 'reference', fill: 0.22, dash: 'dot' },
  cropped: { role: 'reference', fill: 0.12, dash: 'dash' },
  saturated: { role: 'second', fill: 0.2, dash: 'solid' },
  event: { role: 'third', fill: 0.14, dash: 'dashdot' },
};

export const THEME_KINDS: readonly ThemeKind[] = ['light', 'dark', 'contrast-light', 'contrast-dark'];

/** Line of a trace. An interval is drawn in the colour of the data it belongs to. */
export function strokeOf(role: TraceRole, theme: ThemeKind): Stroke {
  const thick = theme.startsWith('contrast') ? 1 : 0;
  const width = (role === 'reference' || role === 'model' ? 1.6 : 1.2) + 0.6 * thick;
  return { colour: ROLES[theme][role === 'interval' ? 'data' : role], width, dash: DASH[role] };
}

/** Fill of a band or bar. */
export function fillOf(
  role: TraceRole,
  theme: ThemeKind,
  opacity = role === 'interval' ? 0.25 : 0.55,
): string {
  return withOpacity(strokeOf(role, theme).colour, opacity);
}

/** Fill and outline of a marked stretch. */
export function markStyle(role: Mark['role'], theme: ThemeKind): Stroke & { readonly fill: string } {
  const { role: trace, fill, dash } = MARKS[role];
  const { colour } = strokeOf(trace, theme);
  return { colour, width: 1, dash, fill: withOpacity(colour, fill) };
}

function withOpacity(hex: string, opacity: number): string {
  const parts = [1, 3, 5].map((i) => parseInt(hex.slice(i, i + 2), 16));
  return `rgba(${parts.join(', ')}, ${opacity})`;
}
