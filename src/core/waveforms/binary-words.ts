import type { WaveformFact } from '../data/kinds';
import { numberText } from '../figures/number-text';
import { totalMass, type Binary } from './binary';

/** "1.4 + 1.4 M☉ inspiral at 100 Mpc". */
export function binaryLabel(what: string, b: Binary, distance: number): string {
  return `${numberText(b.mass1)} + ${numberText(b.mass2)} M☉ ${what} at ${numberText(distance)} Mpc`;
}

interface BinaryParameters {
  readonly binary: Binary;
  readonly distance: number;
  readonly low: number;
  readonly taper: number;
  readonly phase: number;
  readonly redshift: number;
}

/** The parameters a binary's waveform was made with. */
export function binaryFacts(o: BinaryParameters): WaveformFact[] {
  const { binary: b } = o;
  const fact = (id: string, label: string, value: number, unit: string): WaveformFact => ({
    id,
    label,
    value,
    unit,
  });
  return [
    fact('mass-1', 'Larger mass, detector frame', b.mass1, 'M☉'),
    fact('mass-2', 'Smaller mass, detector frame', b.mass2, 'M☉'),
    fact('total-mass', 'Total mass, detector frame', totalMass(b), 'M☉'),
    fact('spin-1', 'Spin of the larger along the orbit’s axis', b.spin1, ''),
    fact('spin-2', 'Spin of the smaller along the orbit’s axis', b.spin2, ''),
    fact('distance', 'Luminosity distance', o.distance, 'Mpc'),
    fact('redshift', 'Redshift', o.redshift, ''),
    fact('low', 'Starts at', o.low, 'Hz'),
    fact('taper', 'Fade at the band’s edges', o.taper, ''),
    fact('phase', 'Phase at t = 0', (o.phase * 180) / Math.PI, '°'),
  ];
}
