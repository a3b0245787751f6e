import type { AnyData } from '../../src/core/data/kinds';
import { DEFAULT_VIEWPORT, type Figure, type Viewport } from '../../src/core/figures/figure';
import { createKernels, type Kernels } from '../../src/core/kernels/kernels';
import { checkParam } from '../../src/core/protocol/param-check';
import { bindInputs, portProblem } from '../../src/core/recipe/ports';
import type { DataKind } from '../../src/core/data/kinds';
import { siteNamed, type Site } from '../../src/core/sites/sites';
import type { ParamSpecs, ParamValues, Step, StepOutcome } from '../../src/core/steps/define';

/** The plain kernels: these tests are about the steps; that both kernels agree is tested with the kernels. */
const plainKernels = createKernels(undefined);

export interface StepRun<O extends DataKind> {
  readonly outcome: StepOutcome<O>;
  /** Calls of `block`. */
  readonly blocks: number;
  /** Value of a number by its id; throws when there is none. */
  number(id: string): number;
  /** Codes of the warnings. */
  readonly codes: readonly string[];
  figures(viewport?: Viewport): readonly Figure[];
}

/** Runs a step as the engine does: ports and parameters checked, defaults filled in. */
export async function runStep<O extends DataKind, S extends ParamSpecs>(
  step: Step<O, S>,
  data: readonly AnyData[],
  given: Readonly<Record<string, unknown>> = {},
  options: {
    memoryLimit?: number;
    files?: Readonly<Record<string, string>>;
    kernels?: Kernels;
    sites?: readonly Site[];
    /** Called at each block; a throw ends the run as a cancel does. */
    onBlock?: () => void;
  } = {},
): Promise<StepRun<O>> {
  const names = data.map((d, i) => `${d.kind}-${i}`);
  const problem = portProblem(
    step.title,
    step.takes,
    data.map((d, i) => ({ name: names[i], kind: d.kind })),
  );
  if (problem !== undefined) throw new Error(problem);
  for (const key of Object.keys(given))
    if (!Object.hasOwn(step.params, key)) throw new Error(`${step.id} has no parameter "${key}"`);
  const values: Record<string, unknown> = {};
  for (const [key, spec] of Object.entries(step.params)) {
    const check = checkParam(spec, Object.hasOwn(given, key) ? given[key] : spec.default);
    if (!check.ok) throw new Error(`${key} ${check.message}`);
    values[key] = check.value;
  }
  const params = values as ParamValues<S>;
  const inputs = bindInputs(names, data);
  let blocks = 0;
  const outcome = await step.run(inputs, params, {
    kernels: options.kernels ?? plainKernels,
    memoryLimit: options.memoryLimit ?? 512 * 2 ** 20,
    readText: (path) => {
      const text = options.files?.[path];
      if (text === undefined) throw new Error(`no file ${path}`);
      return text;
    },
    site: (name) => siteNamed(options.sites ?? [], name, 'test.sites.json'),
    block: async () => {
      blocks++;
      options.onBlock?.();
      await Promise.resolve();
    },
  });
  return {
    outcome,
    blocks,
    number: (id) => {
      const q = outcome.numbers.find((n) => n.id === id);
      if (!q)
        throw new Error(
          `${step.id} gave no number "${id}", only ${outcome.numbers.map((n) => n.id).join(', ')}`,
        );
      return q.value;
    },
    codes: outcome.warnings.map((w) => w.code),
    figures: (viewport = DEFAULT_VIEWPORT) => step.figures(outcome.data, params, inputs, viewport),
  };
}
