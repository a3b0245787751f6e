import { hint, nearestNames } from '../data/nearest';
import type { DataKind } from '../data/kinds';
import { checkParam } from '../protocol/param-check';
import type { AnyStep } from '../steps/define';
import { dependencyOrder } from './order';
import type { ParsedRecipe } from './parse';
import { portProblem, type NamedKind } from './ports';
import { STEP_KEYS, type Recipe, type StepSpec } from './recipe';

/**
 * Checks what the shape alone cannot tell: step names, parameters, what each step consumes, cycles, expectations.
 * Adds to `parsed.tree.diagnostics`; every message of a step carries its id as `subject`.
 */
export function diagnose(parsed: ParsedRecipe, steps: Readonly<Record<string, AnyStep>>): void {
  const recipe = parsed.recipe;
  if (!recipe) return;
  recipe.steps.forEach((spec, i) => {
    const step = Object.hasOwn(steps, spec.do) ? steps[spec.do] : undefined;
    const subject = spec.id;
    if (!step) {
      const suggestions = nearestNames(spec.do, Object.keys(steps));
      const all =
        suggestions.length > 0 ? hint(suggestions) : ` Known steps: ${Object.keys(steps).join(', ')}.`;
      parsed.tree.report(
        parsed.tree.at(['steps', i, 'do']),
        'unknown-step',
        `there is no step "${spec.do}".${all}`,
        {
          suggestions,
          subject,
        },
      );
      return;
    }
    checkParams(parsed, spec, i, step);
    checkOf(parsed, recipe, spec, i, step, steps);
  });
  for (const id of dependencyOrder(recipe).cyclic) {
    const i = recipe.steps.findIndex((s) => s.id === id);
    parsed.tree.report(
      parsed.tree.at(['steps', i, 'of']),
      'cycle',
      `step "${id}" depends on itself through "of"`,
      {
        subject: id,
      },
    );
  }
  for (const key of Object.keys(recipe.expect ?? {})) {
    const id = key.split('.')[0];
    if (recipe.steps.some((s) => s.id === id)) continue;
    const suggestions = nearestNames(
      id,
      recipe.steps.map((s) => s.id),
    );
    parsed.tree.report(
      parsed.tree.at(['expect', key]),
      'unknown-name',
      `expectation "${key}" names no step of this recipe.${hint(suggestions)}`,
      { suggestions },
    );
  }
}

function checkParams(parsed: ParsedRecipe, spec: StepSpec, i: number, step: AnyStep): void {
  const known = Object.keys(step.params);
  for (const [key, raw] of Object.entries(spec.params)) {
    const param = Object.hasOwn(step.params, key) ? step.params[key] : undefined;
    const where = parsed.tree.at(['steps', i, key]);

    if (!param) {
      const suggestions = nearestNames(key, [...known, ...STEP_KEYS]);
      const all =
        suggestions.length > 0
          ? hint(suggestions)
          : known.length > 0
            ? ` It knows: ${known.join(', ')}.`
            : '';
      parsed.tree.report(
        parsed.tree.atKey(['steps', i], key),
        'unknown-parameter',
        `${step.id} has no parameter "${key}".${all}`,
        {
          suggestions,
          subject: spec.id,
        },
      );
      continue;
    }
    const check = checkParam(param, raw);
    if (!check.ok) {
      const suggestions =
        param.kind === 'choice' && typeof raw === 'string' ? nearestNames(raw, param.choices) : [];
      parsed.tree.report(where, 'wrong-value', `"${key}" ${check.message}.${hint(suggestions)}`, {
        suggestions,
        subject: spec.id,
      });
    }
  }
}

function checkOf(
  parsed: ParsedRecipe,
  recipe: Recipe,
  spec: StepSpec,
  i: number,
  step: AnyStep,
  steps: Readonly<Record<string, AnyStep>>,
): void {
  const given: NamedKind[] = [];
  for (const [k, name] of spec.of.entries()) {
    const kind = kindOf(recipe, name, steps);
    if (kind === undefined) {
      const names = [...Object.keys(recipe.inputs), ...recipe.steps.map((s) => s.id)].filter(
        (n) => n !== spec.id,
      );
      const suggestions = nearestNames(name, names);
      parsed.tree.report(
        parsed.tree.at(['steps', i, 'of', k]),
        'unknown-name',
        `"${name}" is neither an input nor a step.${hint(suggestions)}`,
        { suggestions, subject: spec.id },
      );
      return;
    }
    if (kind !== 'unknown') given.push({ name, kind });
    else return;
  }
  const problem = portProblem(step.id, step.takes, given);
  if (problem !== undefined)
    parsed.tree.report(parsed.tree.at(['steps', i, 'of']), 'wrong-input', `${problem}.`, {
      subject: spec.id,
    });
}

/** Kind a name stands for; "unknown" for a step whose operation is itself unknown, which is reported there. */
function kindOf(
  recipe: Recipe,
  name: string,
  steps: Readonly<Record<string, AnyStep>>,
): DataKind | 'unknown' | undefined {
  if (Object.hasOwn(recipe.inputs, name)) return 'series';
  const spec = recipe.steps.find((s) => s.id === name);
  if (!spec) return undefined;
  return Object.hasOwn(steps, spec.do) ? steps[spec.do].gives : 'unknown';
}
