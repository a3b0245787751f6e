import type { Recipe, StepSpec } from './recipe';

/** Steps in an order in which everything a step consumes comes before it, and the ids that sit on a cycle. */
export function dependencyOrder(recipe: Recipe): { order: StepSpec[]; cyclic: string[] } {
  const byId = new Map(recipe.steps.map((s) => [s.id, s]));
  const order: StepSpec[] = [];
  const state = new Map<string, 'open' | 'done'>();
  const cyclic = new Set<string>();
  const visit = (step: StepSpec, path: readonly string[]): void => {
    if (state.get(step.id) === 'done') return;
    if (state.get(step.id) === 'open') {
      for (const id of path.slice(path.indexOf(step.id))) cyclic.add(id);
      return;
    }
    state.set(step.id, 'open');
    for (const name of step.of) {
      const needed = byId.get(name);
      if (needed) visit(needed, [...path, step.id]);
    }
    state.set(step.id, 'done');
    order.push(step);
  };
  for (const step of recipe.steps) visit(step, []);
  return { order, cyclic: [...cyclic] };
}

/** The ids of `wanted` and of everything they need. */
export function withNeeds(recipe: Recipe, wanted: readonly string[]): Set<string> {
  const byId = new Map(recipe.steps.map((s) => [s.id, s]));
  const out = new Set<string>();
  const visit = (id: string): void => {
    const step = byId.get(id);
    if (!step || out.has(id)) return;
    out.add(id);
    step.of.forEach(visit);
  };
  wanted.forEach(visit);
  return out;
}
