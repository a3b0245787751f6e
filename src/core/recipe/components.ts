import type { Recipe } from './recipe';

/**
 * Groups of steps that share neither inputs nor results, so that each group can run on a worker of its own: two sites'
 * spectra are two groups until a step takes both. Ids in document order.
 */
export function independentGroups(recipe: Recipe): string[][] {
  const parent = new Map<string, string>();
  const root = (name: string): string => {
    let at = name;
    for (let up = parent.get(at) ?? at; up !== at; up = parent.get(at) ?? at) at = up;
    return at;
  };
  const active = recipe.steps.filter((s) => !s.off);
  for (const step of active) for (const name of step.of) parent.set(root(step.id), root(name));
  const groups = new Map<string, string[]>();
  for (const step of active) {
    const group = groups.get(root(step.id));
    if (group) group.push(step.id);
    else groups.set(root(step.id), [step.id]);
  }
  return [...groups.values()];
}
