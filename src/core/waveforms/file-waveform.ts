import type { WaveformFact } from '../data/kinds';
import type { Warning } from '../data/quantity';
import { UserError } from '../data/errors';
import { numberText } from '../figures/number-text';
import type { Kernels } from '../kernels/kernels';
import type { NumberColumns } from './columns-text';
import { MPC_SECONDS, SUN_SECONDS } from './constants';
import { fileAgainstFrequency } from './file-frequency';
import { fileAgainstTime } from './file-time';
import type { SignalModel } from './signal-model';

export const FILE_HOLDS = ['strain against time', 'transform against frequency'] as const;
export const FILE_UNITS = ['seconds and strain', 'total mass'] as const;

export interface FileOptions {
  readonly file: NumberColumns;
  readonly holds: (typeof FILE_HOLDS)[number];
  readonly units: (typeof FILE_UNITS)[number];
  /** Mpc at which a file in seconds and strain is stated; null: not known, its strain is taken as it is. */
  readonly fileDistance: number | null;
  /** Mpc to scale to. */
  readonly distance: number;
  /** Detector-frame total mass in M☉, for a file in units of it. */
  readonly totalMass: number;
  /** Hz; null: as far as the file reaches. */
  readonly low: number | null;
  readonly high: number | null;
  /** Fade over this fraction of the length at both ends (time), or of the edges' frequencies. */
  readonly taper: number;
}

/** A file's columns in seconds or Hz, strain or strain/Hz, at the distance asked for. */
export interface ScaledFile {
  readonly name: string;
  readonly x: Float64Array;
  readonly plus: readonly Float64Array[];
  readonly cross: readonly Float64Array[] | undefined;
  readonly distance: number | undefined;
  readonly facts: readonly WaveformFact[];
  readonly warnings: readonly Warning[];
  readonly low: number | null;
  readonly high: number | null;
  readonly taper: number;
}

/**
 * A waveform from columns of numbers. Time: t, h₊ and, if there, h×. Frequency: f, Re h̃₊, Im h̃₊ and, if there, Re h̃×, Im h̃×
 * (kernel e^{−2πift}). In units of the total mass M: t c³/(GM) and h D c²/(GM), or f GM/c³ and h̃ D c⁵/(GM)².
 *
 * @throws UserError for another number of columns, or rows out of order
 */
export function fileWaveform(o: FileOptions, kernels: Kernels): SignalModel {
  const inTime = o.holds === 'strain against time';
  const parts = inTime ? 1 : 2;
  const { name, columns } = o.file;
  if (columns.length !== 1 + parts && columns.length !== 1 + 2 * parts)
    throw new UserError(
      'file-columns',
      inTime
        ? `${name} has ${columns.length} columns; strain against time needs t, h₊ and perhaps h×`
        : `${name} has ${columns.length} columns; a transform needs f, Re h̃₊, Im h̃₊ and perhaps Re h̃×, Im h̃×`,
      name,
    );
  const mass = o.totalMass * SUN_SECONDS;
  const away = o.distance * MPC_SECONDS;
  const geometric = o.units === 'total mass';
  const unitX = geometric ? (inTime ? mass : 1 / mass) : 1;
  const unitH = geometric ? mass ** parts / away : o.fileDistance === null ? 1 : o.fileDistance / o.distance;
  const scaled = columns.slice(1).map((c) => c.map((v) => v * unitH));
  const known = geometric || o.fileDistance !== null;
  const file: ScaledFile = {
    name: name.replace(/^.*[\\/]/, ''),
    x: columns[0].map((v) => v * unitX),
    plus: scaled.slice(0, parts),
    cross: scaled.length > parts ? scaled.slice(parts) : undefined,
    distance: known ? o.distance : undefined,
    facts: [
      { id: 'file', label: 'File', value: name, unit: '' },
      { id: 'holds', label: 'The file holds', value: o.holds, unit: '' },
      ...(known ? [{ id: 'distance', label: 'Luminosity distance', value: o.distance, unit: 'Mpc' }] : []),
      ...(geometric
        ? [{ id: 'total-mass', label: 'Total mass, detector frame', value: o.totalMass, unit: 'M☉' }]
        : []),
    ],
    warnings: known ? [] : [noDistance(name)],
    low: o.low,
    high: o.high,
    taper: o.taper,
  };
  return inTime ? fileAgainstTime(file, kernels) : fileAgainstFrequency(file);
}

const noDistance = (name: string): Warning => ({
  code: 'no-distance',
  severity: 'note',
  found: `no distance is given for ${name}`,
  consequence: 'Its strain is taken as it is; reach and "distance" say nothing about it.',
  remedy: 'Set "file-distance" to the distance in Mpc its strain is stated at.',
});

/** The label of a file's waveform. */
export const fileLabel = (f: ScaledFile): string =>
  f.distance === undefined ? f.name : `${f.name} at ${numberText(f.distance)} Mpc`;
