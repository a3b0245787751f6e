import { UserError } from '../data/errors';

/** A curve read from a file: rising positive frequencies in Hz and the one-sided power density at each. */
export interface NoiseCurve {
  readonly frequency: Float64Array;
  readonly density: Float64Array;
  /** Rows at zero frequency, which a logarithmic interpolation cannot use. */
  readonly skippedZero: number;
}

const COMMENT = /^\s*(?:[#%;!]|\/\/)/;

/**
 * Reads two columns (frequency in Hz, value) separated by blanks, commas, semicolons or tabs. Lines that start with
 * #, %, ;, ! or // are comments; one line of column names may come first. With `holds` "amplitude density" the values are
 * squared.
 *
 * @throws UserError naming file and line: not two numbers, value not positive, frequencies that do not rise, fewer than two rows
 */
export function parseNoiseCurve(
  text: string,
  file: string,
  holds: 'amplitude density' | 'power density',
): NoiseCurve {
  const frequency: number[] = [];
  const density: number[] = [];
  let skippedZero = 0;
  let header = false;
  const fail = (code: string, line: number, what: string): never => {
    throw new UserError(code, `${file}, line ${line}: ${what}`, `${file}:${line}`);
  };
  const lines = text.replace(/^\uFEFF/, '').split(/\r\n|\r|\n/);
  for (const [at, raw] of lines.entries()) {
    const line = at + 1;
    if (raw.trim() === '' || COMMENT.test(raw)) continue;
    const cells = raw.trim().split(/\s*[,;]\s*|\s+/);
    const values = cells.map((c) => (c === '' ? NaN : Number(c)));
    if (!header && frequency.length === 0 && cells.every((c) => Number.isNaN(Number(c)))) {
      header = true;
      continue;
    }
    if (cells.length !== 2)
      fail('curve-columns', line, `two values are needed (frequency, ${holds}), found ${cells.length}`);
    const bad = cells.find((_, i) => !Number.isFinite(values[i]));
    if (bad !== undefined) fail('curve-number', line, `"${bad}" is not a finite number; write it as 1.5e-23`);
    const [f, v] = values as [number, number];
    if (f < 0) fail('curve-frequency', line, `the frequency ${f} Hz is negative`);
    if (v <= 0) fail('curve-value', line, `the ${holds} ${v} is not positive; remove the row`);
    if (f === 0) {
      skippedZero++;
      continue;
    }
    const last = frequency.at(-1);
    if (last !== undefined && f <= last)
      fail(
        'curve-order',
        line,
        `the frequency ${f} Hz does not rise above ${last} Hz; sort the rows by frequency`,
      );
    frequency.push(f);
    density.push(holds === 'amplitude density' ? v * v : v);
  }
  if (frequency.length < 2)
    throw new UserError(
      'curve-short',
      `${file} has ${frequency.length} rows of numbers at positive frequencies; a curve needs at least two`,
      file,
    );
  const underflow = density.indexOf(0);
  if (underflow >= 0)
    throw new UserError(
      'curve-value',
      `${file}: the square of the value at ${frequency[underflow]} Hz is below the smallest float64`,
      file,
    );
  return { frequency: Float64Array.from(frequency), density: Float64Array.from(density), skippedZero };
}

/**
 * Density of a curve at other frequencies: straight lines between the given points in log density against log frequency.
 * Outside the given points NaN, never extrapolated.
 */
export function interpolateCurve(curve: NoiseCurve, frequency: Float64Array): Float64Array {
  const { frequency: x, density } = curve;
  const logX = x.map(Math.log);
  const logY = density.map(Math.log);
  let at = 0;
  return frequency.map((f) => {
    if (!(f >= x[0]) || f > x.at(-1)!) return NaN;
    if (f < x[at]) at = 0;
    while (at < x.length - 2 && f > x[at + 1]) at++;
    if (f === x[at]) return density[at];
    if (f === x[at + 1]) return density[at + 1];
    const t = (Math.log(f) - logX[at]) / (logX[at + 1] - logX[at]);
    return Math.exp(logY[at] + t * (logY[at + 1] - logY[at]));
  });
}
