import { CancelledError, UserError } from '../data/errors';
import type { AnyData } from '../data/kinds';
import { pythonScript } from '../export/script';
import { DEFAULT_VIEWPORT, type Figure } from '../figures/figure';
import type {
  Call,
  Card,
  CardError,
  Diagnostic,
  EngineApi,
  ExportRequest,
  FileDescription,
  InputProvenance,
  PreviewRequest,
  Progress,
  PythonExport,
  RecipeText,
  RedrawRequest,
  RunEvent,
  RunRequest,
  RunResult,
  StepDescription,
  StepProvenance,
} from '../protocol/engine';
import { checkParam, defaultOf } from '../protocol/param-check';
import { steps } from '../steps';
import { parseSites, siteNamed, type Site } from '../sites/sites';
import type { AnyStep, ParamSpecs, ParamValues, StepInputs, StepOutcome } from '../steps/define';
import { ByteCache, bytesOf } from './cache';
import { diagnose } from './diagnose';
import type { EngineHost } from './engine-host';
import { fingerprint } from './fingerprint';
import { InputReader, type PreparedInput } from './inputs';
import { dependencyOrder, withNeeds } from './order';
import { parseRecipe, type ParsedRecipe } from './parse';
import { previewFigure, previewSeries, type Previewed, type PreviewRead } from './preview';
import { bindInputs } from './ports';
import type { StepSpec } from './recipe';

const registry: Readonly<Record<string, AnyStep>> = steps;
/** Longest a run keeps other requests waiting, and shortest time between two progress events. */
const BREATH_MS = 12;
const EVENT_MS = 60;
/** Channels whose envelope is kept for zooming in the data view, and what one takes. */
const PREVIEWS = 16;
const PREVIEW_BYTES = 2 << 20;

interface Kept {
  readonly outcome: StepOutcome;
  readonly step: AnyStep;
  readonly params: ParamValues<ParamSpecs>;
  readonly inputs: StepInputs;
}

/** A value in a running recipe: what it is and what identifies it. */
interface Value {
  readonly data: AnyData;
  readonly print: string;
}

/**
 * Turns recipes into results. One object serves the worker, the command line and the tests; it knows no thread, editor
 * or file system but the host it is given. Results are cached under fingerprint(inputs, step version, parameters), so
 * an edit recomputes only what depends on it.
 */
export class Engine implements EngineApi {
  readonly #host: EngineHost;
  readonly #inputs: InputReader;
  readonly #results: ByteCache<Kept>;
  readonly #previews = new ByteCache<Previewed>(PREVIEWS * PREVIEW_BYTES);

  constructor(host: EngineHost) {
    this.#host = host;
    this.#inputs = new InputReader(host);
    this.#results = new ByteCache(host.cacheLimit);
  }

  async describe({ file }: { file: string }): Promise<FileDescription> {
    await Promise.resolve();
    const open = this.#inputs.open(file);
    return { file, format: open.format, size: open.size, tree: open.tree, channels: open.channels };
  }

  async preview(request: PreviewRequest, call: Call<Progress>): Promise<Figure> {
    const open = this.#inputs.open(request.file);
    const key = JSON.stringify([this.#host.stamp(request.file), request.channel, request.rate]);
    let preview = this.#previews.get(key);
    if (!preview) {
      const read: PreviewRead = (from, to, into) =>
        this.#inputs.open(request.file).read(request.channel, from, to, into);
      preview = await previewSeries(open, request, read, (fraction) =>
        this.#pause(call, () => call.event({ fraction })),
      );
      this.#previews.set(key, preview, PREVIEW_BYTES);
    }
    return previewFigure(preview, request.viewport);
  }

  steps(): Promise<readonly StepDescription[]> {
    return Promise.resolve(
      Object.values(registry).map((s) => ({
        id: s.id,
        title: s.title,
        version: s.version,
        group: s.group,
        summary: s.summary,
        takes: s.takes,
        gives: s.gives,
        params: s.params,
        sources: s.sources,
      })),
    );
  }

  async check(request: RecipeText): Promise<readonly Diagnostic[]> {
    await Promise.resolve();
    return this.#parsed(request).diagnostics;
  }

  async run(request: RunRequest, call: Call<RunEvent>): Promise<RunResult> {
    const parsed = this.#parsed(request);
    const engine = { version: this.#host.version, kernels: this.#host.kernels.kind };
    const recipe = parsed.recipe;
    if (!recipe) return { cards: [], diagnostics: parsed.diagnostics, inputs: [], engine };
    const wanted = request.only && withNeeds(recipe, request.only);
    const order = dependencyOrder(recipe).order.filter((s) => !wanted || wanted.has(s.id));
    const active = order.filter((s) => !s.off);
    call.event({ type: 'waiting', ids: active.map((s) => s.id) });

    const values = new Map<string, Value>();
    const failures = new Map<string, CardError>();
    const provenance: InputProvenance[] = [];
    const needed = new Set(active.flatMap((s) => s.of));
    const cards = new Map<string, Card>();
    const emit = (card: Card): void => {
      cards.set(card.id, card);
      call.event({ type: 'card', card });
    };

    for (const [name, spec] of Object.entries(recipe.inputs)) {
      if (!needed.has(name)) continue;
      const reader = active.find((s) => s.of.includes(name));
      const report = this.#reporter(call, reader?.id ?? name, `reading ${name}`);
      try {
        const bad = parsed.diagnostics.find((d) => d.subject === name && d.severity === 'error');
        if (bad) throw new UserError(bad.code, bad.message);
        const input: PreparedInput = await this.#inputs.prepare(name, spec, request.folder, report);
        values.set(name, { data: input.series, print: input.fingerprint });
        provenance.push(input.provenance);
        call.event({ type: 'input', input: input.provenance });
      } catch (e) {
        if (e instanceof CancelledError) return this.#stopped(order, cards, parsed, provenance, call);
        failures.set(name, { ...cardError(e), input: name });
      }
    }

    for (const spec of order) {
      try {
        emit(await this.#card(spec, parsed, values, failures, request, call));
      } catch (e) {
        if (e instanceof CancelledError) return this.#stopped(order, cards, parsed, provenance, call);
        throw e;
      }
    }
    return {
      cards: recipe.steps.flatMap((s) => cards.get(s.id) ?? []),
      diagnostics: parsed.diagnostics,
      inputs: provenance,
      engine,
    };
  }

  async redraw({ fingerprint: print, viewport }: RedrawRequest): Promise<readonly Figure[]> {
    await Promise.resolve();
    const kept = this.#results.get(print);
    if (!kept) throw new UserError('evicted', 'this result is no longer in memory; run the look again');
    return kept.step.figures(kept.outcome.data, kept.params, kept.inputs, viewport);
  }

  async exportPython(request: ExportRequest, call: Call<RunEvent>): Promise<PythonExport> {
    const result = await this.run(request, call);
    const { recipe } = this.#parsed(request);
    if (!recipe) return { steps: [], leftOut: [], diagnostics: result.diagnostics };
    // The samples were gone through by the run; this finds what it found.
    const inputs = new Map<string, PreparedInput>();
    for (const { name } of result.inputs) {
      const report = this.#reporter(call, name);
      inputs.set(
        name,
        await this.#inputs.prepare(name, recipe.inputs[name], request.folder, (f) => report(f)),
      );
    }
    const rank = new Map(dependencyOrder(recipe).order.map((s, k) => [s.id, k]));
    const wanted = request.only && withNeeds(recipe, request.only);
    const cards = result.cards
      .filter((c) => !wanted || wanted.has(c.id))
      .sort((a, b) => rank.get(a.id)! - rank.get(b.id)!);
    const { dataFolder } = request;
    const made = pythonScript({ recipe, version: this.#host.version, cards, inputs, registry, dataFolder });
    return {
      ...(made.steps.length > 0 ? { script: made.text } : {}),
      steps: made.steps,
      leftOut: made.leftOut,
      diagnostics: result.diagnostics,
    };
  }

  #parsed(request: RecipeText): ParsedRecipe {
    const parsed = parseRecipe(request.text);
    diagnose(parsed, registry);
    return parsed;
  }

  async #card(
    spec: StepSpec,
    parsed: ParsedRecipe,
    values: Map<string, Value>,
    failures: Map<string, CardError>,
    request: RunRequest,
    call: Call<RunEvent>,
  ): Promise<Card> {
    const step = Object.hasOwn(registry, spec.do) ? registry[spec.do] : undefined;
    const base = { id: spec.id, do: spec.do, title: step?.title ?? spec.do, of: spec.of };
    const empty = { ...base, sentence: '', numbers: [], warnings: [], figures: [], tables: [] };
    if (spec.off) {
      failures.set(spec.id, { code: 'off', message: `step "${spec.id}" is switched off` });
      return { ...empty, state: 'off' };
    }
    const wrong = parsed.diagnostics.find((d) => d.subject === spec.id && d.severity === 'error');
    if (wrong || !step) {
      const error = {
        code: wrong?.code ?? 'unknown-step',
        message: wrong?.message ?? `there is no step "${spec.do}"`,
      };
      failures.set(spec.id, error);
      return { ...empty, state: 'failed', error };
    }
    for (const name of spec.of) {
      const failure = failures.get(name);
      if (!failure) continue;
      const error =
        failure.input === name
          ? failure
          : { ...failure, code: 'blocked', message: `waits for "${name}": ${failure.message}` };
      failures.set(spec.id, error);
      return { ...empty, state: failure.input === name ? 'failed' : 'blocked', error };
    }

    const began = this.#host.now();
    const params = resolveParams(step, spec);
    const sources = spec.of.map((name) => values.get(name)!);
    const resolve = (path: string): string => this.#host.resolve(request.folder, path);
    const inputs = bindInputs(
      spec.of,
      sources.map((v) => v.data),
    );
    try {
      const files = Object.entries(step.params).flatMap(([key, p]) =>
        p.kind === 'file' && params[key] !== '' ? [this.#host.stamp(resolve(params[key] as string))] : [],
      );
      const sitesFile = step.usesSites?.(params) === true ? parsed.recipe?.sites : undefined;
      if (sitesFile !== undefined) files.push(this.#host.stamp(resolve(sitesFile)));
      const parts = [step.id, step.version, params, files, sources.map((v) => v.print)];
      const print = fingerprint(this.#host.hasher(), parts);
      let kept = this.#results.get(print);
      const cached = kept !== undefined;
      if (!kept) {
        const report = this.#reporter(call, spec.id);
        await report(0);
        const outcome = await step.run(inputs, params, {
          kernels: this.#host.kernels,
          memoryLimit: this.#host.memoryLimit,
          readText: (path) => this.#host.readText(resolve(path)),
          site: (name) => siteOf(sitesFile, name, (path) => this.#host.readText(resolve(path))),
          block: report,
        });
        kept = { outcome, step, params, inputs };
        this.#results.set(print, kept, bytesOf(outcome));
      }
      const { outcome } = kept;
      const figures = step.figures(outcome.data, params, inputs, request.viewport ?? DEFAULT_VIEWPORT);
      values.set(spec.id, { data: outcome.data, print });
      const provenance: StepProvenance = {
        step: step.id,
        version: step.version,
        params,
        of: spec.of,
        fingerprint: print,
        seconds: (this.#host.now() - began) / 1000,
        cached,
      };
      const { sentence, numbers, warnings } = outcome;
      return {
        ...base,
        state: 'done',
        sentence,
        numbers,
        warnings,
        figures,
        tables: outcome.tables ?? [],
        provenance,
      };
    } catch (e) {
      if (e instanceof CancelledError) throw e;
      const error = cardError(e);
      failures.set(spec.id, error);
      return { ...empty, state: 'failed', error };
    }
  }

  /** Cards of a run the user stopped: what was finished stays, the rest says so. */
  #stopped(
    order: readonly StepSpec[],
    cards: Map<string, Card>,
    parsed: ParsedRecipe,
    inputs: readonly InputProvenance[],
    call: Call<RunEvent>,
  ): RunResult {
    for (const spec of order) {
      if (cards.has(spec.id)) continue;
      const title = Object.hasOwn(registry, spec.do) ? registry[spec.do].title : spec.do;
      const card: Card = {
        id: spec.id,
        do: spec.do,
        title,
        of: spec.of,
        state: spec.off ? 'off' : 'cancelled',
        sentence: '',
        numbers: [],
        warnings: [],
        figures: [],
        tables: [],
      };
      cards.set(spec.id, card);
      call.event({ type: 'card', card });
    }
    const engine = { version: this.#host.version, kernels: this.#host.kernels.kind };
    return {
      cards: parsed.recipe!.steps.flatMap((s) => cards.get(s.id) ?? []),
      diagnostics: parsed.diagnostics,
      inputs,
      engine,
    };
  }

  #lastBreath = 0;

  async #pause(call: Pick<Call<never>, 'cancelled'>, tell: () => void): Promise<void> {
    if (call.cancelled()) throw new CancelledError();
    const now = this.#host.now();
    if (now - this.#lastBreath < BREATH_MS) return;
    tell();
    await this.#host.breathe();
    this.#lastBreath = this.#host.now();
    if (call.cancelled()) throw new CancelledError();
  }

  #reporter(
    call: Call<RunEvent>,
    id: string,
    prefix?: string,
  ): (fraction: number, note?: string) => Promise<void> {
    let told = -Infinity;
    return (fraction, note = prefix) =>
      this.#pause(call, () => {
        const now = this.#host.now();
        if (now - told < EVENT_MS) return;
        told = now;
        call.event({ type: 'running', id, fraction, ...(note === undefined ? {} : { note }) });
      });
  }
}

function siteOf(file: string | undefined, name: string, readText: (path: string) => string): Site {
  if (file === undefined)
    throw new UserError(
      'no-sites',
      `site "${name}" is named, but the recipe has no sites file: add "sites": "….sites.json" beside "inputs"`,
    );
  return siteNamed(parseSites(readText(file), file), name, file);
}

function resolveParams(step: AnyStep, spec: StepSpec): ParamValues<ParamSpecs> {
  const values: Record<string, unknown> = {};
  for (const [key, param] of Object.entries(step.params)) {
    const raw = Object.hasOwn(spec.params, key) ? spec.params[key] : defaultOf(param);
    const check = checkParam(param, raw);
    if (!check.ok) throw new UserError('wrong-value', `"${key}" of step "${spec.id}" ${check.message}`);
    values[key] = check.value;
  }
  return values as ParamValues<ParamSpecs>;
}

function cardError(e: unknown): CardError {
  if (e instanceof UserError) return { code: e.code, message: e.message };
  const error = e instanceof Error ? e : new Error(String(e));
  return {
    code: 'bug',
    message: `internal error: ${error.message}`,
    ...(error.stack === undefined ? {} : { stack: error.stack }),
  };
}
