import { exp } from './elementary';
import { noiseDensity, type NoiseCurve } from './noise-curve';

const FROM = 1;
const TO = 2048;
/** ln(TO/FROM) */
const SPAN = 7.6246189861593985;
const STEPS = 320;

/** Frequencies at which log-log interpolation follows the curve: 320 even steps in log f, and more around each resonance. */
function gridFor(curve: NoiseCurve): number[] {
  const points = new Set(Array.from({ length: STEPS }, (_, k) => FROM * exp((SPAN * k) / STEPS)));
  points.add(TO);
  for (const { frequency, q } of curve.resonances) {
    points.add(frequency);
    for (let width = 1 / 16; width <= q / 2; width *= 1.15) {
      points.add(frequency * (1 + width / (2 * q)));
      points.add(frequency * (1 - width / (2 * q)));
    }
  }
  return [...points].filter((f) => f >= FROM && f <= TO).sort((a, b) => a - b);
}

/** Two columns of text, frequency in Hz and one-sided amplitude density in strain/√Hz: the curve the noise was drawn from. */
export function noiseTable(curve: NoiseCurve, title: string): string {
  const rows = gridFor(curve).map(
    (f) => `${f.toPrecision(10)} ${Math.sqrt(noiseDensity(curve, f)).toExponential(9)}`,
  );
  return [
    `# ${title}: the curve its noise was drawn from (invented; mains lines are not in it)`,
    '# frequency (Hz), one-sided amplitude density (strain/√Hz)',
    ...rows,
    '',
  ].join('\n');
}
