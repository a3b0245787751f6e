import type { ParamSpecs } from '../steps/define';

/** Kaiser's β of each choice, and what the filter then does; measured, and checked by the test of the step. */
export const STOP_BANDS = {
  '53 dB': { beta: 5, decibel: 53, clean: 0.84 },
  '90 dB': { beta: 9, decibel: 90, clean: 0.71 },
} as const;

export const RESAMPLE_PARAMS = {
  rate: {
    kind: 'number',
    label: 'New rate',
    unit: 'Hz',
    default: null,
    min: 0,
    exclusiveMin: true,
    help: 'Samples per second after the step. Left empty: half the present rate. Take at least 2.4 times the highest frequency of interest: what lies close to half the new rate is attenuated.',
  },
  'stop-band': {
    kind: 'choice',
    label: 'Stop band',
    choices: ['53 dB', '90 dB'],
    default: '53 dB',
    help: 'By how much frequencies that would fold are kept down. 53 dB leaves the band clean up to 0.84 of half the lower rate; 90 dB, for data with strong lines above half the new rate, only up to 0.71 of it.',
  },
} as const satisfies ParamSpecs;
