import type { DataKind, DataKinds } from '../data/kinds';
import type { Quantity, Warning } from '../data/quantity';
import type { Table } from '../data/table';
import type { GpsTime } from '../data/gps-time';
import type { Figure, Viewport } from '../figures/figure';
import type { Kernels } from '../kernels/kernels';
import type { Site } from '../sites/sites';

interface Described {
  readonly label: string;
  /** One or two sentences: what it does, when the default is wrong. */
  readonly help: string;
  /** One of the few that are asked for when the step is added from the palette. */
  readonly ask?: true;
}

/** A number with its unit; `default: null` means "the step decides and says what it took". */
export interface NumberParam extends Described {
  readonly kind: 'number';
  readonly unit: string;
  readonly default: number | null;
  readonly min?: number;
  readonly max?: number;
  /** The bound itself is not allowed. */
  readonly exclusiveMin?: boolean;
  readonly integer?: boolean;
  readonly slider?: 'linear' | 'log';
}
export interface ChoiceParam<C extends string = string> extends Described {
  readonly kind: 'choice';
  readonly choices: readonly C[];
  readonly default: C;
}
export interface FlagParam extends Described {
  readonly kind: 'flag';
  readonly default: boolean;
}
export interface TextParam extends Described {
  readonly kind: 'text';
  readonly default: string;
}
/** GPS time, as text or number in the recipe. */
export interface TimeParam extends Described {
  readonly kind: 'time';
  readonly default: null;
}
/** Path relative to the recipe. */
export interface FileParam extends Described {
  readonly kind: 'file';
  readonly default: string;
}
/** A list of numbers, or of groups of numbers when `each` is more than 1 (spans, bands). */
export interface ListParam extends Described {
  readonly kind: 'list';
  readonly unit: string;
  readonly each: number;
  readonly default: readonly number[];
  readonly min?: number;
  readonly max?: number;
}

export type Param = NumberParam | ChoiceParam | FlagParam | TextParam | TimeParam | FileParam | ListParam;
export type ParamSpecs = Readonly<Record<string, Param>>;

export type ParamValue<P extends Param> = P extends { kind: 'number'; default: null }
  ? number | null
  : P extends { kind: 'number'; default: number }
    ? number
    : P extends { kind: 'number' }
      ? number | null
      : P extends { kind: 'choice'; choices: readonly (infer C)[] }
        ? C
        : P extends { kind: 'flag' }
          ? boolean
          : P extends { kind: 'text' | 'file' }
            ? string
            : P extends { kind: 'time' }
              ? GpsTime | null
              : P extends { kind: 'list' }
                ? readonly number[]
                : never;
export type ParamValues<S extends ParamSpecs> = { readonly [K in keyof S]: ParamValue<S[K]> };

/** What a step consumes: resolved from `of` by kind, in order. */
export interface Port {
  readonly kind: DataKind;
  readonly count: 'one' | 'optional' | 'many';
  readonly help: string;
}

/** The inputs of one run of a step. `names` are the ids in `of`, for sentences. */
export interface StepInputs {
  one<K extends DataKind>(kind: K, nth?: number): DataKinds[K];
  optional<K extends DataKind>(kind: K, nth?: number): DataKinds[K] | undefined;
  many<K extends DataKind>(kind: K): readonly DataKinds[K][];
  readonly names: readonly string[];
}

export interface StepContext {
  readonly kernels: Kernels;
  /**
   * Call once per block of work: reports progress in [0, 1], lets other requests in, and throws CancelledError when
   * the user has stopped the run.
   */
  block(fraction: number, note?: string): Promise<void>;
  /** Text of a small file named by a `file` parameter. */
  readText(path: string): string;
  /**
   * A site of the recipe's sites file by name. Only for steps whose `usesSites` says so; throws a UserError when the recipe
   * names no sites file or the file has no such site.
   */
  site(name: string): Site;
  /** Bytes the step should stay under for its own work arrays. */
  readonly memoryLimit: number;
}

export interface StepOutcome<O extends DataKind = DataKind> {
  readonly data: DataKinds[O];
  /** What was done, in one sentence with units and convention. */
  readonly sentence: string;
  readonly numbers: readonly Quantity[];
  readonly warnings: readonly Warning[];
  readonly tables?: readonly Table[];
}

/** Where a formula or a value comes from; `flag` says whether it was read, recalled or computed. */
export interface Source {
  readonly text: string;
  readonly flag: 'read' | 'memory' | 'computed' | 'common practice';
}

export type StepGroup = 'look' | 'noise' | 'condition' | 'picture' | 'signal' | 'search';

export interface Step<O extends DataKind = DataKind, S extends ParamSpecs = ParamSpecs> {
  readonly id: string;
  readonly title: string;
  /** Goes up whenever the same input and parameters may give other numbers. */
  readonly version: number;
  readonly group: StepGroup;
  /** One line for palette and docs. */
  readonly summary: string;
  readonly takes: readonly Port[];
  readonly gives: O;
  readonly params: S;
  readonly sources: readonly Source[];
  /** Whether these parameters make the step read the sites file, which then is part of what identifies the result. */
  usesSites?(params: ParamValues<S>): boolean;
  run(inputs: StepInputs, params: ParamValues<S>, context: StepContext): Promise<StepOutcome<O>>;
  /** Pictures of a result; called again with another viewport when the user zooms. */
  figures(
    data: DataKinds[O],
    params: ParamValues<S>,
    inputs: StepInputs,
    viewport: Viewport,
  ): readonly Figure[];
}

export function defineStep<O extends DataKind, const S extends ParamSpecs>(step: Step<O, S>): Step<O, S> {
  return step;
}

/**
 * A step with its parameter types forgotten, for registries. Parameters are checked against `params` before `run`,
 * which is what makes this safe.
 */
export type AnyStep = Step;
