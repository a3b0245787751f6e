import type { Quantity } from '../data/quantity';
import { numberText } from '../figures/number-text';
import {
  chirpMass,
  chirpTimes,
  iscoFrequency,
  massRatio,
  symmetricRatio,
  totalMass,
  type Binary,
} from './binary';
import { CONSTANTS_SOURCE } from './constants';
import { remnantOf, REMNANT_SOURCE } from './remnant';
import { MODE_SOURCE, ringdownMode } from './ringdown-mode';

const FRAME = 'detector frame';

/** What follows from masses, spins and the frequency where the wave starts. */
export function binaryNumbers(b: Binary, low: number, redshift: number): Quantity[] {
  const { tau0, tau3 } = chirpTimes(b, low);
  const frame =
    redshift === 0 ? FRAME : `${FRAME}: (1 + z) times that of the source, z = ${numberText(redshift)}`;
  const start = `from ${numberText(low)} Hz`;
  return [
    {
      id: 'chirp-mass',
      label: 'Chirp mass',
      value: chirpMass(b),
      unit: 'M☉',
      convention: frame,
      explain: { formula: 'M η^(3/5)', source: 'definition' },
    },
    { id: 'total-mass', label: 'Total mass', value: totalMass(b), unit: 'M☉', convention: frame },
    {
      id: 'symmetric-ratio',
      label: 'Symmetric mass ratio η',
      value: symmetricRatio(b),
      unit: '',
      convention: `m₁m₂/M², at most 1/4; m₁/m₂ = ${numberText(massRatio(b))}`,
    },
    ...(redshift === 0
      ? []
      : [
          {
            id: 'source-chirp-mass',
            label: 'Chirp mass in the source’s frame',
            value: chirpMass(b) / (1 + redshift),
            unit: 'M☉',
            convention: 'detector-frame mass / (1 + z)',
          },
        ]),
    {
      id: 'isco',
      label: 'Last stable circular orbit',
      value: iscoFrequency(b),
      unit: 'Hz',
      convention: 'frequency of the wave, total mass without spin',
      explain: {
        formula: 'c³/(6^(3/2) π G M)',
        source: `Schwarzschild orbit at r = 6GM/c² (textbook); ${CONSTANTS_SOURCE}`,
      },
    },
    {
      id: 'tau0',
      label: 'Chirp time τ₀',
      value: tau0,
      unit: 's',
      convention: `${start}: time to coalescence at lowest order`,
      explain: {
        formula: '5/(256 π f η) (πGMf/c³)^(−5/3)',
        source:
          'Peters, Phys. Rev. 136, B1224 (1964), READ; Owen & Sathyaprakash, Phys. Rev. D 60, 022002 (1999), MEMORY',
      },
    },
    {
      id: 'tau3',
      label: 'Chirp time τ₃',
      value: tau3,
      unit: 's',
      convention: `${start}: 1.5PN term`,
      explain: {
        formula: '1/(8 f η) (πGMf/c³)^(−2/3)',
        source: 'Owen & Sathyaprakash, Phys. Rev. D 60, 022002 (1999), MEMORY',
      },
    },
    ...remnantNumbers(b),
  ];
}

function remnantNumbers(b: Binary): Quantity[] {
  const { mass, spin } = remnantOf(b);
  const out: Quantity[] = [
    {
      id: 'remnant-mass',
      label: 'Mass left behind',
      value: mass,
      unit: 'M☉',
      convention: `${FRAME}, if both are black holes`,
      explain: { formula: 'M − E/c², fit in η and the spins', source: REMNANT_SOURCE },
    },
    {
      id: 'remnant-spin',
      label: 'Spin left behind',
      value: spin,
      unit: '',
      convention: 'cJ/(GM²) along the orbit’s axis, if both are black holes',
      explain: { formula: 'fit in η and the spins', source: REMNANT_SOURCE },
    },
  ];
  if (spin < 0 || spin >= 1) return out;
  return [...out, ...modeNumbers(mass, spin)];
}

/** Frequency and decay of the ring-down of a black hole. */
export function modeNumbers(mass: number, spin: number): Quantity[] {
  const mode = ringdownMode(mass, spin);
  return [
    {
      id: 'ringdown-frequency',
      label: 'Ring-down frequency',
      value: mode.frequency,
      unit: 'Hz',
      convention: `l = m = 2, slowest decaying; fit good to 1.5 %`,
      explain: { formula: '[1.5251 − 1.1568 (1 − j)^0.1292] c³/(2πGM)', source: MODE_SOURCE },
    },
    {
      id: 'ringdown-decay',
      label: 'Ring-down time',
      value: mode.decay,
      unit: 's',
      convention: `amplitude falls by e; Q = ${numberText(mode.quality)}`,
      explain: { formula: 'Q/(π f), Q = 0.7 + 1.4187 (1 − j)^−0.499', source: MODE_SOURCE },
    },
  ];
}

/** How long the wave lasts and how often it swings, from the stationary phase. */
export function durationNumbers(seconds: number, cycles: number, span: string): Quantity[] {
  const source = 'stationary phase: the time of frequency f is dψ/df / 2π';
  return [
    {
      id: 'duration',
      label: 'Time in band',
      value: seconds,
      unit: 's',
      convention: span,
      explain: { formula: '[dψ/df] / 2π between the two', source },
    },
    {
      id: 'cycles',
      label: 'Cycles in band',
      value: cycles,
      unit: '',
      convention: `of the wave, ${span}`,
      explain: { formula: '[f dψ/df − ψ] / 2π between the two', source },
    },
  ];
}
