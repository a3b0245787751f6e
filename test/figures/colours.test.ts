import { describe, expect, it } from 'vitest';
import type { TraceRole } from '../../src/core/figures/figure';
import { markStyle, strokeOf, THEME_KINDS, type ThemeKind } from '../../src/core/figures/colours';

const ROLES: TraceRole[] = ['data', 'second', 'third', 'reference', 'model'];
/** Grounds of the editor's own four default themes. */
const GROUND: Record<ThemeKind, string> = {
  light: '#ffffff',
  dark: '#1f1f1f',
  'contrast-light': '#ffffff',
  'contrast-dark': '#000000',
};

type Triple = [number, number, number];
const channels = (hex: string): Triple =>
  [1, 3, 5].map((i) => parseInt(hex.slice(i, i + 2), 16) / 255) as Triple;
/** sRGB to linear light, IEC 61966-2-1. */
const linear = (v: number): number => (v <= 0.04045 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4);

/** Contrast ratio of WCAG 2.1 (relative luminance with 0.2126, 0.7152, 0.0722 and 0.05 of flare; MEMORY). */
function contrast(a: string, b: string): number {
  const luminance = (hex: string): number => {
    const [r, g, bl] = channels(hex).map(linear) as Triple;
    return 0.2126 * r + 0.7152 * g + 0.0722 * bl;
  };
  const [low, high] = [luminance(a), luminance(b)].sort((x, y) => x - y);
  return (high + 0.05) / (low + 0.05);
}

/**
 * What people without one kind of cone see: Machado, Oliveira & Fernandes, IEEE Trans. Vis. Comput. Graph. 15, 1291
 * (2009), severity 1 (MEMORY). Each row must keep white white, which the first test proves.
 */
const SIGHT: Record<string, readonly Triple[]> = {
  normal: [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ],
  protanopia: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deuteranopia: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
  tritanopia: [
    [1.255528, -0.076749, -0.178779],
    [-0.078411, 0.930809, 0.147602],
    [0.004733, 0.691367, 0.3039],
  ],
};

/** CIE L*a*b* for D65 of a colour as seen. */
function lab(hex: string, sight: readonly Triple[]): Triple {
  const rgb = channels(hex).map(linear) as Triple;
  const [r, g, b] = sight.map((row) =>
    Math.max(
      0,
      Math.min(
        1,
        row.reduce((n, k, i) => n + k * rgb[i], 0),
      ),
    ),
  ) as Triple;
  const f = (t: number): number => (t > 216 / 24389 ? Math.cbrt(t) : ((24389 / 27) * t + 16) / 116);
  const x = f((0.4124564 * r + 0.3575761 * g + 0.1804375 * b) / 0.95047);
  const y = f(0.2126729 * r + 0.7151522 * g + 0.072175 * b);
  const z = f((0.0193339 * r + 0.119192 * g + 0.9503041 * b) / 1.08883);
  return [116 * y - 16, 500 * (x - y), 200 * (y - z)];
}

const distance = (a: Triple, b: Triple): number => Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);

describe('figure colours', () => {
  it('uses sight matrices that leave white alone', () => {
    for (const rows of Object.values(SIGHT))
      for (const row of rows) expect(row[0] + row[1] + row[2]).toBeCloseTo(1, 4);
  });

  it.each(THEME_KINDS)('%s: every role stands out from the ground', (theme) => {
    const needed = theme.startsWith('contrast') ? 7 : 3;
    for (const role of ROLES)
      expect(contrast(strokeOf(role, theme).colour, GROUND[theme]), role).toBeGreaterThanOrEqual(needed);
  });

  it.each(THEME_KINDS)('%s: solid roles stay apart in every kind of sight', (theme) => {
    const solid = ROLES.filter((r) => strokeOf(r, theme).dash === 'solid');
    expect(solid.length).toBeGreaterThan(2);
    for (const [name, sight] of Object.entries(SIGHT))
      for (const a of solid)
        for (const b of solid) {
          if (a >= b) continue;
          const d = distance(lab(strokeOf(a, theme).colour, sight), lab(strokeOf(b, theme).colour, sight));
          expect(d, `${a} and ${b}, ${name}`).toBeGreaterThan(30);
        }
  });

  it('tells roles that are not data apart by their dashes too', () => {
    const dashes = new Set((['data', 'reference', 'model'] as const).map((r) => strokeOf(r, 'dark').dash));
    expect(dashes.size).toBe(3);
  });

  it('tells the kinds of marks apart by their outlines', () => {
    const kinds = (['gap', 'cropped', 'saturated', 'event'] as const).map((r) => markStyle(r, 'light').dash);
    expect(new Set(kinds).size).toBe(4);
  });
});
