import { UserError } from '../data/errors';
import type { LineList } from '../data/kinds';
import { numberText } from '../figures/number-text';
import { notch } from '../kernels/notch';
import type { SectionRows } from '../kernels/kernels';

/** More notches than this are a comb that no data survive. */
const MOST = 400;

export interface NotchPlace {
  readonly frequency: number;
  readonly q: number;
  /** Where it comes from. */
  readonly from: 'list' | 'harmonic' | 'lines';
}

export interface NotchRequest {
  readonly frequencies: readonly number[];
  readonly harmonics: number;
  readonly q: number;
  /** Lines found elsewhere, and how far above the floor they must stand. */
  readonly lines: LineList | undefined;
  readonly height: number;
  readonly rate: number;
  readonly label: string;
}

export interface NotchPlan {
  readonly places: readonly NotchPlace[];
  /** Lines and harmonics at or above half the rate, left out. */
  readonly above: number;
  /** Places that fell onto another within a quarter of its width, left out. */
  readonly merged: number;
  readonly rows: SectionRows;
}

/**
 * Where to notch: the listed frequencies, multiples of them, and the lines of a list. A place within a quarter of the
 * width of one that is there already is the same notch.
 *
 * @throws UserError when nothing is named, or a listed frequency has no place below half the rate
 */
export function planNotches(request: NotchRequest): NotchPlan {
  const { frequencies, harmonics, q, lines, height, rate, label } = request;
  const nyquist = rate / 2;
  const wanted: NotchPlace[] = frequencies.map((frequency) => ({ frequency, q, from: 'list' }));
  for (const f of frequencies)
    if (f >= nyquist)
      throw new UserError(
        'notch-frequency',
        `a notch at ${numberText(f, 9)} Hz is not below ${numberText(nyquist, 9)} Hz, half the sample rate of ${label}: take it out of "frequencies"`,
      );
  for (const f of frequencies)
    for (let k = 2; k <= harmonics; k++) wanted.push({ frequency: k * f, q, from: 'harmonic' });
  for (const line of lines?.lines ?? [])
    if (line.height >= height) wanted.push({ frequency: line.frequency, q, from: 'lines' });
  if (wanted.length === 0)
    throw new UserError(
      'no-notch',
      lines
        ? `none of the ${lines.lines.length} lines of ${lines.label} stands ${numberText(height)} times above the floor, and "frequencies" names none: lower "height"`
        : 'nothing to notch: name Hz in "frequencies", or add the step "lines" and feed it in',
    );
  const inBand = wanted.filter((p) => p.frequency < nyquist * 0.999);
  const places: NotchPlace[] = [];
  for (const place of inBand) {
    const near = places.some((p) => Math.abs(p.frequency - place.frequency) < place.frequency / place.q / 4);
    if (!near) places.push(place);
  }
  places.sort((a, b) => a.frequency - b.frequency);
  if (places.length > MOST)
    throw new UserError(
      'many-notches',
      `${places.length} notches are more than ${MOST}: raise "height" or lower "harmonics"`,
    );
  return {
    places,
    above: wanted.length - inBand.length,
    merged: inBand.length - places.length,
    rows: places.map((p) => notch(p.frequency, p.q, rate)),
  };
}
