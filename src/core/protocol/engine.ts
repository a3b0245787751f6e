import type { Quantity, Warning } from '../data/quantity';
import type { Table } from '../data/table';
import type { ChannelFacts, FileNode } from '../formats/format';
import type { Figure, Viewport } from '../figures/figure';
import type { Port, Param, Source, StepGroup } from '../steps/define';

/**
 * The engine's boundary, written once. Worker, command line and tests call the same methods; the messages that cross
 * a thread are derived from this interface (see rpc.ts). Everything here is plain data and typed arrays.
 */
export interface EngineApi {
  /** Tree and channels of a data file. */
  describe(request: { file: string }, call: Call<never>): Promise<FileDescription>;
  /** A picture of a channel before any look exists: envelope over the whole or a span, thinned to the viewport. */
  preview(request: PreviewRequest, call: Call<Progress>): Promise<Figure>;
  /** The steps there are, for forms, menus and help. */
  steps(request: Record<string, never>, call: Call<never>): Promise<readonly StepDescription[]>;
  /** Problems of a recipe's text with their positions. Reads channel names of the inputs when the files are there. */
  check(request: RecipeText, call: Call<never>): Promise<readonly Diagnostic[]>;
  /** Runs a recipe; cards come as events while they finish, and all of them at the end. */
  run(request: RunRequest, call: Call<RunEvent>): Promise<RunResult>;
  /** Draws a card's figures for another viewport from the result kept under `fingerprint`; fails with code "evicted" when it is gone. */
  redraw(request: RedrawRequest, call: Call<Progress>): Promise<readonly Figure[]>;
  /** Runs a recipe and writes a script in Python that computes the same numbers and compares. */
  exportPython(request: ExportRequest, call: Call<RunEvent>): Promise<PythonExport>;
}

/** Carried by every call: where events go, and whether the caller has given up. */
export interface Call<E> {
  event(e: E): void;
  cancelled(): boolean;
}

export interface Progress {
  readonly fraction: number;
  readonly note?: string;
}

export interface FileDescription {
  readonly file: string;
  readonly format: string;
  readonly size: number;
  readonly tree: FileNode;
  readonly channels: readonly ChannelFacts[];
}

export interface PreviewRequest {
  readonly file: string;
  readonly channel: string;
  readonly rate?: number;
  readonly viewport: Viewport;
}

/** A recipe's text and the folder its paths are relative to. */
export interface RecipeText {
  readonly text: string;
  readonly folder: string;
}

export interface RunRequest extends RecipeText {
  /** Only these steps and what they need; absent means all. */
  readonly only?: readonly string[];
  readonly viewport?: Viewport;
}

export interface ExportRequest extends RecipeText {
  /** Only these steps and what they need; absent means all. */
  readonly only?: readonly string[];
  /** The recipe's folder as seen from the script's: "." when both are in one place. */
  readonly dataFolder: string;
}

export interface PythonExport {
  /** Absent when nothing could be exported: the diagnostics or `leftOut` say why. */
  readonly script?: string;
  /** Ids of the steps it computes. */
  readonly steps: readonly string[];
  /** Steps it leaves out, why, and whether the step itself did not finish. */
  readonly leftOut: readonly {
    readonly id: string;
    readonly do: string;
    readonly why: string;
    readonly failed: boolean;
  }[];
  readonly diagnostics: readonly Diagnostic[];
}

export type RunEvent =
  | { readonly type: 'waiting'; readonly ids: readonly string[] }
  | { readonly type: 'running'; readonly id: string; readonly fraction: number; readonly note?: string }
  | { readonly type: 'input'; readonly input: InputProvenance }
  | { readonly type: 'card'; readonly card: Card };

export interface RunResult {
  readonly cards: readonly Card[];
  readonly diagnostics: readonly Diagnostic[];
  readonly inputs: readonly InputProvenance[];
  readonly engine: EngineFacts;
}

export interface EngineFacts {
  readonly version: string;
  readonly kernels: 'wasm' | 'plain';
}

/** A step's result as it travels. */
export interface Card {
  readonly id: string;
  readonly do: string;
  readonly title: string;
  readonly of: readonly string[];
  readonly state: 'done' | 'failed' | 'cancelled' | 'blocked' | 'off';
  readonly sentence: string;
  readonly numbers: readonly Quantity[];
  readonly warnings: readonly Warning[];
  readonly figures: readonly Figure[];
  readonly tables: readonly Table[];
  /** Set when state is failed or blocked. */
  readonly error?: CardError;
  readonly provenance?: StepProvenance;
}

export interface CardError {
  readonly code: string;
  readonly message: string;
  /** Only for bugs: errors that are not the user's to fix. */
  readonly stack?: string;
  /** For code "needs-rate" and the like: which input must be told something, so the panel can ask. */
  readonly input?: string;
}

export interface StepProvenance {
  readonly step: string;
  readonly version: number;
  /** Every parameter as used, defaults included. */
  readonly params: Readonly<Record<string, unknown>>;
  readonly of: readonly string[];
  readonly fingerprint: string;
  readonly seconds: number;
  /** True when the result came from the cache. */
  readonly cached: boolean;
}

export interface InputProvenance {
  readonly name: string;
  readonly file: string;
  readonly format: string;
  readonly channel: string;
  readonly unit: string;
  readonly rate: number;
  readonly rateFrom: string;
  readonly start: string;
  readonly startFrom: string;
  /** False when neither the file nor the recipe says the start: times then count from GPS 0. */
  readonly startKnown: boolean;
  readonly samples: number;
  readonly duration: number;
  /** SHA-256 over the samples used, each as little-endian float64 (NaN as 7ff8000000000000), so it does not depend on the container. */
  readonly sha256: string;
  readonly notFinite: number;
  readonly gaps: readonly { readonly start: string; readonly seconds: number }[];
}

export interface RedrawRequest {
  readonly fingerprint: string;
  readonly viewport: Viewport;
}

export interface Diagnostic {
  readonly severity: 'error' | 'warning';
  readonly code: string;
  readonly message: string;
  /** Offsets into the text, half-open, and the same as 1-based line and column. */
  readonly from: number;
  readonly to: number;
  readonly line: number;
  readonly column: number;
  /** Nearest known names, best first. */
  readonly suggestions: readonly string[];
  /** Step or input it is about. */
  readonly subject?: string;
}

export interface StepDescription {
  readonly id: string;
  readonly title: string;
  readonly version: number;
  readonly group: StepGroup;
  readonly summary: string;
  readonly takes: readonly Port[];
  readonly gives: string;
  readonly params: Readonly<Record<string, Param>>;
  readonly sources: readonly Source[];
}
