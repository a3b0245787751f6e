import { UserError } from '../data/errors';
import { bilinear, toBandpass, toBandstop, toHighpass, toLowpass } from './iir-design-band';
import { toSections, type Section } from './iir-design-sections';
import { butterworthPrototype, type ZerosPoles } from './iir-prototype';
import { chebyshev1Prototype, chebyshev2Prototype } from './iir-prototype-chebyshev';
import { ellipticPrototype } from './iir-prototype-elliptic';

export const IIR_FAMILIES = ['butterworth', 'chebyshev-1', 'chebyshev-2', 'elliptic'] as const;
export type IirFamily = (typeof IIR_FAMILIES)[number];

export const IIR_BANDS = ['lowpass', 'highpass', 'bandpass', 'bandstop'] as const;
export type IirBand = (typeof IIR_BANDS)[number];

export interface IirSpec {
  readonly family: IirFamily;
  readonly band: IirBand;
  /** Order of the lowpass it is made from, 1 to 30. Bandpass and bandstop have twice as many poles. */
  readonly order: number;
  /**
   * Edges in Hz: one for lowpass and highpass, low and high for the others. Gain there: butterworth −3.01 dB,
   * chebyshev-1 and elliptic −ripple, chebyshev-2 −attenuation (the beginning of the stop band).
   */
  readonly edges: readonly number[];
  /** Samples per second. */
  readonly rate: number;
  /** Largest loss in the pass band, dB (chebyshev-1, elliptic). */
  readonly ripple?: number;
  /** Smallest loss in the stop band, dB (chebyshev-2, elliptic). */
  readonly attenuation?: number;
}

const MAX_ORDER = 30;

/**
 * A digital filter as second-order sections, in rows b0, b1, b2, 1, a1, a2.
 *
 * Analog prototype, band transformation, bilinear transformation with both edges exact. Equal to SciPy's `butter`,
 * `cheby1`, `cheby2`, `ellip` with output='sos'. There is no transfer-function form on purpose: its coefficients lose
 * all digits for a narrow or low band (20 to 300 Hz at 16384 Hz from order 6 on).
 *
 * Sections keep digits down to edges of about 1e-6 of the rate; below that resample first.
 *
 * @throws UserError naming the parameter that cannot be met.
 * @example designIir({ family: 'butterworth', band: 'lowpass', order: 1, edges: [1], rate: 4 })[0] // [0.5, 0.5, 0, 1, 0, 0]
 */
export function designIir(spec: IirSpec): Section[] {
  const edges = checkedEdges(spec);
  const h = prototype(spec);
  // The bilinear transformation bends the frequency axis; bending the edges first puts them back in place.
  const [w, w2 = NaN] = edges.map((f) => Math.tan((Math.PI * f) / spec.rate));
  switch (spec.band) {
    case 'lowpass':
      return toSections(bilinear(toLowpass(h, w)));
    case 'highpass':
      return toSections(bilinear(toHighpass(h, w)));
    case 'bandpass':
      return toSections(bilinear(toBandpass(h, w, w2)));
    case 'bandstop':
      return toSections(bilinear(toBandstop(h, w, w2)));
  }
}

function prototype({ family, order, ripple, attenuation }: IirSpec): ZerosPoles {
  if (!Number.isInteger(order) || order < 1 || order > MAX_ORDER)
    throw new UserError(
      'filter-order',
      `filter order ${order}: it must be a whole number from 1 to ${MAX_ORDER}`,
    );
  const decibel = (name: string, value: number | undefined): number => {
    if (value !== undefined && value > 0 && Number.isFinite(value)) return value;
    throw new UserError(
      `filter-${name}`,
      `a ${family} filter needs ${name === 'ripple' ? 'a pass-band ripple' : 'a stop-band attenuation'} above 0 dB, not ${value ?? 'nothing'}`,
    );
  };
  switch (family) {
    case 'butterworth':
      return butterworthPrototype(order);
    case 'chebyshev-1':
      return chebyshev1Prototype(order, decibel('ripple', ripple));
    case 'chebyshev-2':
      return chebyshev2Prototype(order, decibel('attenuation', attenuation));
    case 'elliptic': {
      const [low, high] = [decibel('ripple', ripple), decibel('attenuation', attenuation)];
      if (low >= high)
        throw new UserError(
          'filter-attenuation',
          `an elliptic filter needs more attenuation in the stop band (${high} dB) than ripple in the pass band (${low} dB)`,
        );
      return ellipticPrototype(order, low, high);
    }
  }
}

function checkedEdges({ band, edges, rate }: IirSpec): readonly number[] {
  if (!(rate > 0 && Number.isFinite(rate)))
    throw new UserError('filter-rate', `sample rate ${rate} Hz: it must be a number above 0`);
  const wanted = band === 'lowpass' || band === 'highpass' ? 1 : 2;
  if (edges.length !== wanted)
    throw new UserError(
      'filter-edges',
      `a ${band} filter has ${wanted === 1 ? 'one edge' : 'two edges, low and high'}; ${edges.length} given`,
    );
  for (const f of edges)
    if (!(f > 0 && f < rate / 2))
      throw new UserError(
        'filter-edges',
        `filter edge ${f} Hz: it must lie above 0 and below ${rate / 2} Hz, half the sample rate`,
      );
  if (wanted === 2 && edges[0] >= edges[1])
    throw new UserError(
      'filter-edges',
      `${band} from ${edges[0]} to ${edges[1]} Hz: the low edge must be below the high edge`,
    );
  return edges;
}
