import * as vscode from 'vscode';
import { CancelledError, UserError } from '../../core/data/errors';
import type {
  Card,
  Diagnostic,
  EngineFacts,
  InputProvenance,
  StepDescription,
} from '../../core/protocol/engine';
import type { CardHead, CardView, LookOutline, LookState, RunView } from '../../core/protocol/panel';
import type { Figure, Viewport } from '../../core/figures/figure';
import { parseRecipe } from '../../core/recipe/parse';
import type { Recipe } from '../../core/recipe/recipe';
import { basename } from 'node:path';
import type { Services } from '../services';
import { addableSteps, namedKinds } from './addable';
import { recipeFolder } from './documents';
import { outsidePaths } from './outside-paths';
import { Results } from './results';
import { stepSignatures } from './signatures';
import { InputWatch } from './input-watch';

/** Time without an edit before the document is run again. */
const QUIET_MS = 150;
const DEFAULT_WIDTH = 900;

export type LookChange =
  /** Too much to tell apart: send the whole state. */
  | { readonly type: 'all' }
  | { readonly type: 'outline' }
  | { readonly type: 'card'; readonly id: string }
  | { readonly type: 'progress'; readonly id: string; readonly fraction: number; readonly note?: string };

/**
 * One recipe document being looked at, by however many panels. The document is the only state that matters: this
 * object turns its text into results and tells the panels what changed.
 */
export class LookSession implements vscode.Disposable {
  readonly document: vscode.TextDocument;
  readonly #services: Services;
  readonly #results = new Results();
  readonly #changed = new vscode.EventEmitter<LookChange>();
  readonly onDidChange = this.#changed.event;
  readonly #watch: InputWatch;
  readonly #listener: vscode.Disposable;

  #recipe: Recipe | undefined;
  #problems: readonly Diagnostic[] = [];
  #steps: readonly StepDescription[] = [];
  #inputs: readonly InputProvenance[] = [];
  #engine: EngineFacts | undefined;
  #run: RunView = { state: 'idle' };
  #abort: AbortController | undefined;
  #timer: NodeJS.Timeout | undefined;
  #generation = 0;
  width = DEFAULT_WIDTH;

  constructor(document: vscode.TextDocument, services: Services) {
    this.document = document;
    this.#services = services;
    this.#watch = new InputWatch(() => this.filesChanged());
    this.#listener = vscode.workspace.onDidChangeTextDocument((e) => {
      if (e.document === document && e.contentChanges.length > 0) this.#textChanged();
    });
    this.#read();
    void this.#start();
  }

  get recipe(): Recipe | undefined {
    return this.#recipe;
  }

  get run(): RunView {
    return this.#run;
  }

  get steps(): readonly StepDescription[] {
    return this.#steps;
  }

  async #start(): Promise<void> {
    try {
      this.#steps = await this.#services.engine.steps();
    } catch (e) {
      this.#break(e);
      return;
    }
    // Forms are made from the steps, which a page that was ready before the engine has not got.
    this.#changed.fire({ type: 'all' });
    await this.runNow();
  }

  #textChanged(): void {
    this.#abandon();
    this.#read();
    this.#changed.fire({ type: 'outline' });
    clearTimeout(this.#timer);
    this.#timer = setTimeout(() => void this.runNow(), QUIET_MS);
  }

  /** A file under the look has other content: every result is stale, and the look runs again. */
  filesChanged(): void {
    this.#generation += 1;
    this.#textChanged();
  }

  /** Takes the text in. When it cannot be read the last good recipe stays, and its cards are stale. */
  #read(): void {
    const parsed = parseRecipe(this.document.getText());
    this.#results.broken = parsed.recipe === undefined;
    if (!parsed.recipe) {
      this.#problems = parsed.diagnostics;
      return;
    }
    this.#recipe = parsed.recipe;
    this.#results.setSignatures(stepSignatures(parsed.recipe, this.#generation));
    this.#watch.follow(
      recipeFolder(this.document.uri),
      Object.values(parsed.recipe.inputs).map((i) => i.file),
    );
  }

  #abandon(): void {
    this.#abort?.abort();
    this.#abort = undefined;
    this.#results.clearRun();
    this.#run = { state: 'idle' };
  }

  /** Runs the document as it is now; `asked` when the user pressed the button rather than edited. */
  async runNow(asked = false): Promise<void> {
    clearTimeout(this.#timer);
    this.#abandon();
    if (asked) this.#generation += 1;
    this.#read();
    const outside = this.#untrustedPaths();
    if (outside.length > 0) {
      const message = `This folder is not trusted, and the recipe reads outside it (${outside.join(', ')}). Trust the folder to run it.`;
      this.#run = { state: 'held', message };
      this.#changed.fire({ type: 'outline' });
      return;
    }
    const abort = new AbortController();
    this.#abort = abort;
    this.#run = { state: 'running' };
    this.#changed.fire({ type: 'outline' });
    const mine = (): boolean => this.#abort === abort;
    try {
      const text = this.document.getText();
      const folder = recipeFolder(this.document.uri);
      // First what is wrong with the text, since a run may take long.
      const problems = await this.#services.engine.api.check({ text, folder });
      if (!mine()) return;
      this.#problems = problems;
      if (problems.length > 0) this.#changed.fire({ type: 'outline' });
      const result = await this.#services.engine.api.run(
        { text, folder, viewport: { width: this.width } },
        {
          signal: abort.signal,
          onEvent: (event) => {
            if (!mine()) return;
            if (event.type === 'input') {
              this.#inputs = [...this.#inputs.filter((i) => i.name !== event.input.name), event.input];
              this.#changed.fire({ type: 'outline' });
            }
            const change = this.#results.apply(event);
            if (event.type === 'running' && this.#results.head(event.id, false).state === 'running')
              this.#changed.fire({ ...event, type: 'progress' });
            if (change.card !== undefined) this.#changed.fire({ type: 'card', id: change.card });
            if (change.heads) this.#changed.fire({ type: 'outline' });
          },
        },
      );
      if (!mine()) return;
      this.#problems = result.diagnostics;
      if (result.inputs.length > 0) this.#inputs = result.inputs;
      this.#engine = result.engine;
      this.#results.stop('cancelled');
      this.#run = { state: 'idle' };
      this.#remember(result.cards);
    } catch (e) {
      if (!mine()) return;
      this.#break(e);
      return;
    }
    this.#changed.fire({ type: 'outline' });
  }

  #remember(cards: readonly Card[]): void {
    if (this.document.isUntitled) return;
    const on = cards.filter((c) => c.state !== 'off');
    this.#services.recent.add({
      path: this.document.uri.fsPath,
      at: Date.now(),
      steps: on.length,
      done: on.filter((c) => c.state === 'done').length,
      warnings: on.reduce((n, c) => n + c.warnings.length, 0),
    });
  }

  #break(e: unknown): void {
    if (e instanceof CancelledError) {
      this.#results.stop('cancelled');
      this.#run = { state: 'idle' };
    } else {
      const message = e instanceof Error ? e.message : String(e);
      this.#services.log.error(e instanceof Error ? e : message);
      this.#results.stop('failed', { code: 'engine', message: `${message}. Run the look to try again.` });
      this.#run = { state: 'broken', message };
    }
    this.#changed.fire({ type: 'outline' });
  }

  cancel(): void {
    clearTimeout(this.#timer);
    this.#abort?.abort();
  }

  /** Figures of a card for another viewport; runs the step again when the engine has dropped its result. */
  async redraw(id: string, fingerprint: string, viewport: Viewport): Promise<readonly Figure[]> {
    const ask = (): Promise<readonly Figure[]> => this.#services.engine.api.redraw({ fingerprint, viewport });
    try {
      return await ask();
    } catch (e) {
      if (!(e instanceof UserError) || e.code !== 'evicted') throw e;
      const text = this.document.getText();
      const folder = recipeFolder(this.document.uri);
      await this.#services.engine.api.run({ text, folder, only: [id], viewport });
      return ask();
    }
  }

  #untrustedPaths(): string[] {
    if (vscode.workspace.isTrusted || !this.#recipe) return [];
    const roots = (vscode.workspace.workspaceFolders ?? []).map((f) => f.uri.fsPath);
    return outsidePaths(this.#recipe, recipeFolder(this.document.uri), roots, this.#steps);
  }

  outline(): LookOutline {
    const recipe = this.#recipe;
    return {
      name: basename(this.document.uri.path),
      unsaved: this.document.isUntitled,
      ...(recipe?.title === undefined ? {} : { title: recipe.title }),
      inputs: Object.entries(recipe?.inputs ?? {}).map(([name, spec]) => {
        const facts = this.#inputs.find((i) => i.name === name);
        return { name, spec, ...(facts ? { facts } : {}) };
      }),
      heads: this.#heads(),
      problems: this.#problems,
      run: this.#run,
      addable: recipe ? addableSteps(recipe, this.#steps) : [],
      names: recipe ? namedKinds(recipe, this.#steps) : [],
      ...(this.#engine ? { engine: this.#engine } : {}),
    };
  }

  state(): LookState {
    const { heads, ...rest } = this.outline();
    return { ...rest, cards: heads.map((h) => this.#view(h)), steps: this.#steps };
  }

  cardView(id: string): CardView | undefined {
    const head = this.#heads().find((h) => h.id === id);
    return head && this.#view(head);
  }

  #view(head: CardHead): CardView {
    const card = this.#results.card(head.id);
    return card ? { ...head, card } : head;
  }

  #heads(): CardHead[] {
    const titles = new Map(this.#steps.map((s) => [s.id, s.title]));
    const seen = new Set<string>();
    return (this.#recipe?.steps ?? []).flatMap((s) => {
      if (seen.has(s.id)) return [];
      seen.add(s.id);
      const title = titles.get(s.do) ?? s.do;
      const { id, of, params, off } = s;
      return [{ id, do: s.do, title, of, params, off, ...this.#results.head(id, off) }];
    });
  }

  dispose(): void {
    clearTimeout(this.#timer);
    this.#abort?.abort();
    this.#watch.dispose();
    this.#listener.dispose();
    this.#changed.dispose();
  }
}
