/** A number as the user sees it: never without unit and meaning. */
export interface Quantity {
  /** Key in `expect`, together with the step's id: `noise.floor`. */
  readonly id: string;
  readonly label: string;
  readonly value: number;
  /** "" for a pure number. */
  readonly unit: string;
  /** How it is counted: "one-sided", "about zero", "bins of the window". */
  readonly convention?: string;
  /** Interval, with its meaning in `intervalMeaning` (for example "90 % of one bin"). */
  readonly low?: number;
  readonly high?: number;
  readonly intervalMeaning?: string;
  readonly explain?: Explanation;
}

export interface Explanation {
  /** Plain text formula. */
  readonly formula: string;
  /** Paper or standard, or "common practice, no source". */
  readonly source: string;
}

/** A warning belongs to the result: stable code, what was found, the number, the consequence, the remedy. */
export interface Warning {
  readonly code: string;
  readonly severity: 'note' | 'caution' | 'problem';
  readonly found: string;
  readonly value?: number;
  readonly consequence: string;
  readonly remedy: string;
  /** Edit of the recipe that applies the remedy in one click. */
  readonly fix?: RecipeFix;
}

export type RecipeFix =
  | { readonly kind: 'set'; readonly label: string; readonly params: Readonly<Record<string, unknown>> }
  | {
      readonly kind: 'input';
      readonly label: string;
      readonly input: string;
      readonly values: Readonly<Record<string, unknown>>;
    };
