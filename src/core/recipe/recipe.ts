/** The document. See docs/recipe.md; parsed by parse.ts, never by hand. */
export interface Recipe {
  readonly fringe: 1;
  readonly title?: string;
  /** Sites file, relative to the recipe. */
  readonly sites?: string;
  readonly inputs: Readonly<Record<string, InputSpec>>;
  readonly steps: readonly StepSpec[];
  readonly expect?: Readonly<Record<string, Expectation>>;
}

export interface InputSpec {
  /** Relative to the recipe's folder. */
  readonly file: string;
  /** May be left out when the file has one channel only. */
  readonly channel?: string;
  /** First instant of the span, GPS; text keeps nanoseconds. Absent: the start of the channel. */
  readonly start?: string | number;
  /** Seconds. Absent: to the end of the channel. */
  readonly duration?: number;
  /** Hz: said by the user because the file does not, or because it is wrong. */
  readonly rate?: number;
  /** GPS time of the channel's first sample, said by the user. */
  readonly epoch?: string | number;
  readonly unit?: string;
  /** Samples are multiplied by this (an integer type's volts or strain per count). */
  readonly scale?: number;
}

export interface StepSpec {
  readonly id: string;
  readonly do: string;
  readonly of: readonly string[];
  /** Kept in the document but not run. */
  readonly off: boolean;
  readonly params: Readonly<Record<string, unknown>>;
}

export interface Expectation {
  readonly value: number;
  readonly rel?: number;
  readonly abs?: number;
}

/** Keys of a step that are not parameters. */
export const STEP_KEYS = ['id', 'do', 'of', 'off'] as const;
