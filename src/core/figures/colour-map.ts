import type { ThemeKind } from './colours';

/** Steps of a map. */
export const SHADES = 256;

/** Lightness, chroma and hue (OKLCH) at the quiet and the loud end; on a light ground quiet is light. */
interface Ramp {
  readonly lightness: readonly [number, number];
  readonly hue: readonly [number, number];
  /** Chroma in the middle; it falls to a quarter at both ends. */
  readonly chroma: number;
}

const RAMPS: Readonly<Record<ThemeKind, Ramp>> = {
  dark: { lightness: [0.2, 0.97], hue: [250, 95], chroma: 0.13 },
  light: { lightness: [0.985, 0.24], hue: [95, -75], chroma: 0.13 },
  'contrast-dark': { lightness: [0, 1], hue: [250, 95], chroma: 0.12 },
  'contrast-light': { lightness: [1, 0.1], hue: [95, -75], chroma: 0.12 },
};

const cache = new Map<ThemeKind, Uint8Array>();

/**
 * Colours of a map as red, green, blue for each of 256 values: lightness rises (on a light ground falls) in equal steps as
 * the eye sees them, so that equal differences look equal in every kind of sight and in grey print. Path of our own in
 * OKLCH (Ottosson 2020).
 */
export function mapColours(kind: ThemeKind): Uint8Array {
  const known = cache.get(kind);
  if (known) return known;
  const { lightness, hue, chroma } = RAMPS[kind];
  const table = new Uint8Array(3 * SHADES);
  for (let i = 0; i < SHADES; i++) {
    const t = i / (SHADES - 1);
    const l = lightness[0] + t * (lightness[1] - lightness[0]);
    const h = ((hue[0] + t * (hue[1] - hue[0])) * Math.PI) / 180;
    const c = chroma * (0.25 + 0.75 * Math.sin(Math.PI * t));
    table.set(srgb(l, c * Math.cos(h), c * Math.sin(h)), 3 * i);
  }
  cache.set(kind, table);
  return table;
}

/** OKLab to sRGB in 0 to 255; what lies outside of the gamut is clipped. */
function srgb(lightness: number, a: number, b: number): [number, number, number] {
  const l = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3;
  const m = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3;
  const s = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3;
  const gamma = (v: number): number => {
    const c = Math.max(0, Math.min(1, v));
    return Math.round(255 * (c <= 0.0031308 ? 12.92 * c : 1.055 * c ** (1 / 2.4) - 0.055));
  };
  return [
    gamma(4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s),
    gamma(-1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s),
    gamma(-0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s),
  ];
}
