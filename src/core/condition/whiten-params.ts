import type { ParamSpecs } from '../steps/define';
import { OWN_SEGMENT_PARAM } from '../noise/segment-params';

export const WHITEN_PARAMS = {
  low: {
    kind: 'number',
    label: 'From',
    unit: 'Hz',
    default: 20,
    min: 0,
    help: 'Lowest frequency kept. Below it the noise wall carries no signal, and what is whitened there makes slow wander as large as everything else. 0 keeps all.',
  },
  high: {
    kind: 'number',
    label: 'To',
    unit: 'Hz',
    default: null,
    min: 0,
    exclusiveMin: true,
    help: 'Highest frequency kept. Left empty: half the sample rate, or as far as the spectrum reaches. Set it below where the data have been filtered away (after resampling up, for example).',
  },
  reach: {
    kind: 'number',
    label: 'Reach of the filter',
    unit: 's',
    default: 2,
    min: 0,
    exclusiveMin: true,
    help: 'Seconds the whitening filter may reach to either side, which is also what is dropped at each end of a valid span. Its frequency resolution is 1.36 divided by this: raise it when narrow lines stay in, lower it when the data are short.',
  },
  segment: {
    ...OWN_SEGMENT_PARAM,
    help: `${OWN_SEGMENT_PARAM.help} With n segments the variance comes out too large by about 0.75/n.`,
  },
} as const satisfies ParamSpecs;
