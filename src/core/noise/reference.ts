import { UserError } from '../data/errors';
import { interpolateCurve, parseNoiseCurve, type NoiseCurve } from './curve-file';
import { modelDensity, NOISE_MODELS, type NoiseModel, type NoiseModelId } from './models';

/** Highest frequency at which a model is tabulated when no spectrum says otherwise. */
const TOP = 8192;
/** Points per decade of such a table: between two of them √S changes by under 1 % everywhere but in the models' walls. */
const PER_DECADE = 400;

/** A reference curve: a model or a file, evaluated wherever it is asked for. */
export interface Reference {
  readonly label: string;
  /** Where the curve says anything, in Hz. */
  readonly range: readonly [from: number, to: number];
  /** Rows of a file at zero frequency that were passed over. */
  readonly skippedZero: number;
  /** The published model, when it is one. */
  readonly model?: NoiseModel;
  /** Frequencies to tabulate it at when nothing else asks. */
  readonly ownGrid: Float64Array;
  /** One-sided density in strain²/Hz at each frequency; NaN outside the range. */
  readonly at: (frequency: Float64Array) => Float64Array;
}

/** What a curve is chosen by: a model's name or "file". */
export const REFERENCE_CHOICES = [...NOISE_MODELS.map((m) => m.id), 'file'] as readonly (
  NoiseModelId | 'file'
)[];

/** @throws UserError when the file is missing, not a curve, or named although a model is chosen */
export function reference(
  choice: NoiseModelId | 'file',
  file: string,
  holds: 'amplitude density' | 'power density',
  readText: (path: string) => string,
): Reference {
  if (choice !== 'file') {
    if (file !== '')
      throw new UserError(
        'file-not-used',
        `"file" names ${file}, but "curve" is "${choice}": set "curve" to "file", or leave "file" out`,
      );
    return ofModel(NOISE_MODELS.find((m) => m.id === choice)!);
  }
  if (file === '')
    throw new UserError('file-missing', '"curve" is "file": name the two-column file in "file"');
  return ofCurve(parseNoiseCurve(readText(file), file, holds), file);
}

function ofModel(model: NoiseModel): Reference {
  const points = Math.ceil(PER_DECADE * Math.log10(TOP / model.from)) + 1;
  const ratio = (TOP / model.from) ** (1 / (points - 1));
  const ownGrid = Float64Array.from({ length: points }, (_, k) => model.from * ratio ** k);
  return {
    label: model.id,
    range: [model.from, Infinity],
    skippedZero: 0,
    model,
    ownGrid,
    at: (f) => modelDensity(model, f),
  };
}

function ofCurve(curve: NoiseCurve, file: string): Reference {
  return {
    label: file.replace(/^.*[\\/]/, ''),
    range: [curve.frequency[0], curve.frequency.at(-1)!],
    skippedZero: curve.skippedZero,
    ownGrid: curve.frequency,
    at: (f) => interpolateCurve(curve, f),
  };
}
