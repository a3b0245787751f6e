import { UserError } from '../data/errors';
import type { Warning } from '../data/quantity';
import { counted, numberText } from '../figures/number-text';
import type { ListParam } from '../steps/define';

export type Band = readonly [low: number, high: number];

export const BANDS_PARAM = {
  kind: 'list',
  label: 'Bands',
  unit: 'Hz',
  each: 2,
  default: [20, 60, 60, 120, 120, 300, 300, 1000],
  min: 0,
  help: 'Bands as pairs of frequencies. What lies outside the frequencies at hand is cut off.',
} as const satisfies ListParam;

export interface Bands {
  readonly bands: readonly Band[];
  readonly warnings: readonly Warning[];
}

/** Id of a band in numbers and curves: "20-60". */
export const bandId = (name: string, [low, high]: Band): string =>
  `${name}-${numberText(low)}-${numberText(high)}`;
export const bandText = ([low, high]: Band): string => `${numberText(low)} to ${numberText(high)} Hz`;

/**
 * Bands from a list of pairs, cut to the frequencies at hand; those of which nothing is left are dropped with a warning.
 * When none is left the whole range is one band.
 *
 * @param least narrowest band in Hz worth keeping
 * @throws UserError when a pair is not a band
 */
export function bandsWithin(list: readonly number[], low: number, high: number, least: number): Bands {
  const bands: Band[] = [];
  const dropped: string[] = [];
  for (let i = 0; i + 1 < list.length; i += 2) {
    const [a, b] = [list[i], list[i + 1]];
    if (!(b > a))
      throw new UserError(
        'band-order',
        `"bands" has the pair ${numberText(a)}, ${numberText(b)}: the second must be higher than the first (Hz)`,
      );
    const cut: Band = [Math.max(a, low), Math.min(b, high)];
    if (cut[1] - cut[0] >= least) bands.push(cut);
    else dropped.push(`${numberText(a)}–${numberText(b)}`);
  }
  const whole = bands.length === 0;
  if (whole) bands.push([low, high]);
  const warnings: Warning[] =
    dropped.length === 0
      ? []
      : [
          {
            code: 'band-outside',
            severity: 'note',
            found: `${counted(dropped.length, 'band')} (${dropped.join(', ')} Hz) not within ${numberText(low)} to ${numberText(high)} Hz`,
            value: dropped.length,
            consequence: whole
              ? 'None is left; the whole range is taken as one band.'
              : 'There is no value for them.',
            remedy: 'Change "bands", or use data of a higher rate.',
          },
        ];
  return { bands, warnings };
}
