import type { Figure, Viewport } from '../figures/figure';
import type { RecipeEdit } from '../recipe/edit';
import type { InputSpec } from '../recipe/recipe';
import type {
  Card,
  CardError,
  Diagnostic,
  EngineFacts,
  FileDescription,
  InputProvenance,
  StepDescription,
} from './engine';

/**
 * The boundary between the editor's side and a page, written once. A page can be thrown away and rebuilt at any time:
 * it says "ready" and gets its whole state; everything after that is a change of it. Every message of the editor's
 * side carries a number that only rises, so a page can drop what is older than what it shows.
 */
export type { RecipeEdit };
export type ParamSpec = StepDescription['params'][string];

/** `stale`: the result shown belongs to an earlier text. The others are what the engine says. */
export type CardState = 'waiting' | 'running' | 'done' | 'failed' | 'cancelled' | 'stale' | 'blocked' | 'off';

/** A step of the document as the panel shows it, without its result. */
export interface CardHead {
  readonly id: string;
  readonly do: string;
  readonly title: string;
  readonly of: readonly string[];
  /** Parameters as they stand in the document. */
  readonly params: Readonly<Record<string, unknown>>;
  readonly off: boolean;
  readonly state: CardState;
  readonly fraction?: number;
  readonly note?: string;
  /** Set when the run itself broke (the engine died), so that there is no card to say why. */
  readonly failure?: CardError;
}

export interface CardView extends CardHead {
  /** Last result; may belong to an earlier text, then the state is not "done". */
  readonly card?: Card;
}

export interface InputView {
  readonly name: string;
  readonly spec: InputSpec;
  /** What the last run found; absent before the first. */
  readonly facts?: InputProvenance;
}

/** An input or step, and the kind of data it stands for ("" when its operation is unknown). */
export interface NamedKind {
  readonly name: string;
  readonly kind: string;
}

/** A step that could be added, with the inputs it would get. */
export interface Addable {
  readonly do: string;
  readonly title: string;
  readonly summary: string;
  readonly group: StepDescription['group'];
  readonly of: readonly string[];
}

export interface RunView {
  /** `held`: not run yet because the folder is not trusted; the user may still ask for it. */
  readonly state: 'idle' | 'running' | 'broken' | 'held';
  readonly message?: string;
}

/** Everything of a look but the results, sent again whenever the document or the run changes. */
export interface LookOutline {
  /** File name of the recipe, and whether it has a name on disk yet. */
  readonly name: string;
  readonly unsaved: boolean;
  readonly title?: string;
  readonly inputs: readonly InputView[];
  readonly heads: readonly CardHead[];
  readonly problems: readonly Diagnostic[];
  readonly run: RunView;
  readonly addable: readonly Addable[];
  /** What a step may consume, in the order of the document. */
  readonly names: readonly NamedKind[];
  readonly engine?: EngineFacts;
}

export interface LookState extends Omit<LookOutline, 'heads'> {
  readonly cards: readonly CardView[];
  readonly steps: readonly StepDescription[];
}

export type ToLookPage =
  | { readonly type: 'look'; readonly seq: number; readonly state: LookState }
  | { readonly type: 'outline'; readonly seq: number; readonly outline: LookOutline }
  | { readonly type: 'card'; readonly seq: number; readonly card: CardView }
  | {
      readonly type: 'progress';
      readonly seq: number;
      readonly id: string;
      readonly fraction: number;
      readonly note?: string;
    }
  | {
      readonly type: 'figures';
      readonly seq: number;
      /** Number of the page's request this answers. */
      readonly request: number;
      readonly id: string;
      readonly figures: readonly Figure[];
    }
  | {
      readonly type: 'figures-failed';
      readonly seq: number;
      readonly request: number;
      readonly id: string;
      readonly message: string;
    }
  | { readonly type: 'reveal'; readonly seq: number; readonly id: string };

export type FromLookPage =
  | { readonly type: 'ready'; readonly width: number }
  | { readonly type: 'edit'; readonly edit: RecipeEdit }
  | { readonly type: 'run' }
  | { readonly type: 'cancel' }
  | {
      readonly type: 'redraw';
      readonly request: number;
      readonly id: string;
      readonly fingerprint: string;
      readonly viewport: Viewport;
    }
  /** Shows the text beside the panel with the cursor at an offset. */
  | { readonly type: 'open-text'; readonly offset: number }
  | Common;

/** What either page may ask for. */
type Common =
  | { readonly type: 'copy'; readonly text: string; readonly what: string }
  /** A picture as SVG text, to be saved where the user says; `name` is a suggestion without ending. */
  | { readonly type: 'save-picture'; readonly name: string; readonly svg: string }
  | { readonly type: 'page-error'; readonly message: string };

export interface DataState {
  readonly name: string;
  readonly path: string;
  readonly description?: FileDescription;
  /** Why the file cannot be read. */
  readonly error?: CardError;
}

export type ToDataPage =
  | { readonly type: 'data'; readonly seq: number; readonly state: DataState }
  | { readonly type: 'preview'; readonly seq: number; readonly request: number; readonly figure: Figure }
  | {
      readonly type: 'preview-progress';
      readonly seq: number;
      readonly request: number;
      readonly fraction: number;
    }
  | {
      readonly type: 'preview-failed';
      readonly seq: number;
      readonly request: number;
      readonly error: CardError;
    };

/** What the user says about a channel that the file does not: goes into the recipe's input. */
export interface ChannelAnswers {
  readonly rate?: number;
  readonly epoch?: string;
}

export type FromDataPage =
  | { readonly type: 'ready' }
  | {
      readonly type: 'preview';
      readonly request: number;
      readonly channel: string;
      readonly rate?: number;
      readonly viewport: Viewport;
    }
  | {
      readonly type: 'start-look';
      readonly channel: string;
      readonly answers: ChannelAnswers;
      /** Span in seconds after the first sample; absent means all. */
      readonly span?: readonly [from: number, to: number];
    }
  | Common;

/**
 * Messages between editor and page travel as JSON with typed arrays beside it, which turns NaN and infinities outside
 * typed arrays into null and drops undefined. This spells them out; `unpack` is the way back. Typed arrays pass untouched.
 */
export function pack(value: unknown): unknown {
  if (value === undefined) return { $value: 'undefined' };
  if (typeof value === 'number') return Number.isFinite(value) ? value : { $value: String(value) };
  if (Array.isArray(value)) return value.map(pack);
  if (isPlain(value)) return Object.fromEntries(Object.entries(value).map(([k, v]) => [k, pack(v)]));
  return value;
}

/** Undoes `pack`. */
export function unpack(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(unpack);
  if (!isPlain(value)) return value;
  const word = value['$value'];
  if (typeof word === 'string') return word === 'undefined' ? undefined : Number(word);
  return Object.fromEntries(Object.entries(value).map(([k, v]) => [k, unpack(v)]));
}

function isPlain(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && Object.getPrototypeOf(value) === Object.prototype;
}
