import { gaussianNoise } from '../steps/synthetic';

/** How the data of a case are made: the sum of its parts, then its defects. Kept in `case.json` beside the recipe. */
export interface CaseData {
  readonly rate: number;
  readonly seconds: number;
  readonly parts: readonly Part[];
  readonly defects?: readonly Defect[];
}

type Part =
  | { readonly kind: 'white'; readonly sigma: number; readonly seed: number }
  | {
      readonly kind: 'sine';
      readonly amplitude: number;
      readonly frequency: number;
      /** Seconds; the whole length without them. */
      readonly from?: number;
      readonly to?: number;
    };
type Defect =
  /** Seconds. */
  | { readonly kind: 'missing'; readonly from: number; readonly to: number }
  | { readonly kind: 'clip'; readonly at: number };

export interface Case {
  /** What the case shows, and where its expected numbers come from. */
  readonly about: string;
  readonly data: CaseData;
  /** Every warning the run gives, as step.code; any other fails the case. */
  readonly warnings: readonly string[];
}

export function makeSamples({ rate, seconds, parts, defects = [] }: CaseData): Float64Array<ArrayBuffer> {
  const x = new Float64Array(rate * seconds);
  for (const part of parts) {
    const add = part.kind === 'white' ? gaussianNoise(x.length, part.sigma, part.seed) : undefined;
    for (let i = 0; i < x.length; i++) {
      x[i] += add
        ? add[i]
        : part.kind === 'sine' && i >= (part.from ?? 0) * rate && i < (part.to ?? Infinity) * rate
          ? part.amplitude * Math.sin((2 * Math.PI * part.frequency * i) / rate)
          : 0;
    }
  }
  for (const d of defects) {
    if (d.kind === 'missing') x.fill(NaN, d.from * rate, d.to * rate);
    else for (let i = 0; i < x.length; i++) x[i] = Math.max(-d.at, Math.min(d.at, x[i]));
  }
  return x;
}

/** A version 1.0 NPY file of little-endian float64. */
export function npyBytes(samples: Float64Array<ArrayBuffer>): Uint8Array {
  const text = `{'descr': '<f8', 'fortran_order': False, 'shape': (${samples.length},), }`;
  const header = `${text.padEnd(Math.ceil((text.length + 11) / 64) * 64 - 11)}\n`;
  const head = Buffer.from(`\x93NUMPY\x01\x00\x00\x00${header}`, 'latin1');
  head.writeUInt16LE(header.length, 8);
  return Buffer.concat([head, Buffer.from(samples.buffer)]);
}
