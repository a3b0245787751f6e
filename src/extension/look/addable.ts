import type { StepDescription } from '../../core/protocol/engine';
import type { Addable, NamedKind } from '../../core/protocol/panel';
import type { Recipe } from '../../core/recipe/recipe';

/**
 * Steps whose needs the recipe can meet, each with the names it would consume: for every kind the newest step that
 * gives it, else the first input. Derived from the steps' ports alone, so a new step needs no word here.
 */
export function addableSteps(recipe: Recipe, steps: readonly StepDescription[]): Addable[] {
  return steps.flatMap((step) => {
    const of: string[] = [];
    for (const port of step.takes) {
      if (port.count === 'optional') continue;
      const names = namesOfKind(recipe, steps, port.kind).filter((n) => !of.includes(n));
      if (names.length === 0) return [];
      of.push(...(port.count === 'many' ? names : names.slice(0, 1)));
    }
    return [{ do: step.id, title: step.title, summary: step.summary, group: step.group, of }];
  });
}

/** Everything a step's `of` may name, with the kind of data behind it. */
export function namedKinds(recipe: Recipe, steps: readonly StepDescription[]): NamedKind[] {
  const gives = new Map(steps.map((s) => [s.id, s.gives]));
  return [
    ...Object.keys(recipe.inputs).map((name) => ({ name, kind: 'series' })),
    ...recipe.steps.map((s) => ({ name: s.id, kind: gives.get(s.do) ?? '' })),
  ];
}

/** Names that stand for data of a kind, best first: latest step that is on, then inputs in their order. */
function namesOfKind(recipe: Recipe, steps: readonly StepDescription[], kind: string): string[] {
  const off = new Set(recipe.steps.filter((s) => s.off).map((s) => s.id));
  const names = namedKinds(recipe, steps)
    .filter((n) => n.kind === kind && !off.has(n.name))
    .map((n) => n.name);
  const isInput = (name: string): boolean => Object.hasOwn(recipe.inputs, name);
  return [...names.filter((n) => !isInput(n)).reverse(), ...names.filter(isInput)];
}
