import type { EngineApi, RunEvent, RunRequest, RunResult } from '../core/protocol/engine';
import type { CallOptions, Client } from '../core/protocol/rpc';
import { independentGroups } from '../core/recipe/components';
import { parseRecipe } from '../core/recipe/parse';
import { EngineClient } from './engine-client';

/** Engines on several threads. Tasks wait in one queue, so that a slow one holds up no other worker. */
export class WorkerPool {
  readonly #engines: readonly EngineClient[];
  readonly #idle: EngineClient[];
  readonly #waiting: ((engine: EngineClient) => void)[] = [];

  constructor(dist: string, size: number) {
    this.#engines = Array.from({ length: size }, () => EngineClient.start(dist));
    this.#idle = [...this.#engines];
  }

  /** Runs a task on the next free engine. */
  async task<T>(work: (api: Client<EngineApi>) => Promise<T>): Promise<T> {
    const engine = this.#idle.pop() ?? (await new Promise<EngineClient>((take) => this.#waiting.push(take)));
    try {
      return await work(engine.api);
    } finally {
      const next = this.#waiting.shift();
      if (next) next(engine);
      else this.#idle.push(engine);
    }
  }

  /** Runs a recipe with its independent groups of steps spread over the workers; the result is that of one engine. */
  async run(request: RunRequest, options: CallOptions<RunEvent> = {}): Promise<RunResult> {
    const recipe = parseRecipe(request.text).recipe;
    const groups = recipe ? independentGroups(recipe) : [];
    if (groups.length < 2 || request.only) return this.task((api) => api.run(request, options));
    const results = await Promise.all(
      groups.map((only) => this.task((api) => api.run({ ...request, only }, options))),
    );
    const cards = results.flatMap((r) => r.cards);
    const off = recipe!.steps.filter((s) => s.off);
    const rest =
      off.length > 0
        ? await this.task((api) => api.run({ ...request, only: off.map((s) => s.id) }, options))
        : undefined;
    cards.push(...(rest?.cards.filter((c) => c.state === 'off') ?? []));
    const inputs = new Map(results.flatMap((r) => r.inputs).map((i) => [i.name, i]));
    return {
      cards: recipe!.steps.flatMap((s) => cards.find((c) => c.id === s.id) ?? []),
      diagnostics: results[0].diagnostics,
      inputs: Object.keys(recipe!.inputs).flatMap((name) => inputs.get(name) ?? []),
      engine: results[0].engine,
    };
  }

  async dispose(): Promise<void> {
    await Promise.all(this.#engines.map((e) => e.dispose()));
  }
}
