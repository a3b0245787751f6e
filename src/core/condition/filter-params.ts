import type { ParamSpecs } from '../steps/define';
import { IIR_FAMILIES } from '../kernels/iir-design';

export const DIRECTION_PARAM = {
  kind: 'choice',
  label: 'Direction',
  choices: ['zero-phase', 'causal'],
  default: 'zero-phase',
  help: 'Zero-phase runs forwards and backwards: nothing is delayed, the response is applied twice, and the filter rings before a transient as well as after it. Causal runs once: half the attenuation, but signals come later by the group delay, which differs with frequency.',
} as const;

export const CROP_PARAM = {
  kind: 'number',
  label: 'Crop',
  unit: 's',
  default: null,
  min: 0,
  help: 'Seconds given up where the filter rings into the data from an edge of a valid span. Left empty: until the ringing has fallen to 1 % of its amplitude. Steep data (large power outside the band) can need more.',
} as const;

/** Shape of a filter made from a prototype, shared by the steps that design one. */
export const SHAPE_PARAMS = {
  order: {
    kind: 'number',
    label: 'Order',
    unit: '',
    default: 4,
    min: 1,
    max: 30,
    integer: true,
    help: 'Order of the low-pass the filter is made from. Higher is steeper and rings longer; zero-phase doubles it in effect.',
  },
  family: {
    kind: 'choice',
    label: 'Family',
    choices: IIR_FAMILIES,
    default: 'butterworth',
    help: 'Butterworth is flat in the pass band; Chebyshev-1 trades ripple there for steepness; Chebyshev-2 is flat in the pass band and has a floor in the stop band; elliptic has both and is steepest. The edge is where the gain is −3 dB (Butterworth), −ripple (Chebyshev-1, elliptic) or −attenuation (Chebyshev-2) in one pass.',
  },
  ripple: {
    kind: 'number',
    label: 'Ripple',
    unit: 'dB',
    default: 0.5,
    min: 0,
    max: 20,
    exclusiveMin: true,
    help: 'Largest loss in the pass band of one pass; used by Chebyshev-1 and elliptic only.',
  },
  attenuation: {
    kind: 'number',
    label: 'Attenuation',
    unit: 'dB',
    default: 60,
    min: 0,
    max: 300,
    exclusiveMin: true,
    help: 'Smallest loss in the stop band of one pass; used by Chebyshev-2 and elliptic only.',
  },
  direction: DIRECTION_PARAM,
  crop: CROP_PARAM,
} as const satisfies ParamSpecs;
