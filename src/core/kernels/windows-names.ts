/** Every window by its name in a recipe: usable as the choices of a parameter. */
export const WINDOW_NAMES = [
  'boxcar',
  'bartlett',
  'cosine',
  'hann',
  'hamming',
  'blackman',
  'nuttall',
  'blackman-harris',
  'flat-top',
  'tukey',
  'kaiser',
  'gaussian',
  'HFT70',
  'HFT90D',
  'HFT95',
  'HFT116D',
  'HFT144D',
  'HFT196D',
  'HFT223D',
  'HFT248D',
] as const;
export type WindowName = (typeof WINDOW_NAMES)[number];

/** Shape parameters; each is read by one window only. */
export interface WindowShape {
  /** tukey: tapered part of the length, 0 (boxcar) to 1 (Hann). Default 0.25. */
  readonly alpha?: number;
  /** kaiser: β ≥ 0; Harris' α is β/π. Default 3π, Harris' α = 3. */
  readonly beta?: number;
  /** gaussian: standard deviation in samples, > 0. Default n/6, Harris' α = 3. */
  readonly std?: number;
}

/**
 * Highest sidelobe of each window in dB relative to its main lobe, with default shape. A line or a steep spectrum more
 * than this above its surroundings shows through. Computed by `windowFigures` (a test compares); tukey and kaiser move
 * with their shape, see `windowFigures`.
 */
export const WINDOW_SIDELOBE_DB: Readonly<Record<WindowName, number>> = {
  boxcar: -13.26,
  bartlett: -26.52,
  cosine: -23.0,
  hann: -31.47,
  hamming: -42.68,
  blackman: -58.11,
  nuttall: -98.17,
  'blackman-harris': -92.01,
  'flat-top': -93.03,
  tukey: -13.6,
  kaiser: -69.62,
  gaussian: -56.07,
  HFT70: -70.45,
  HFT90D: -90.22,
  HFT95: -95.0,
  HFT116D: -116.8,
  HFT144D: -144.05,
  HFT196D: -196.21,
  HFT223D: -222.99,
  HFT248D: -248.39,
};
