import type { Recipe } from '../../core/recipe/recipe';

/**
 * A text per step that changes exactly when the step's result may: operation, parameters, and all it consumes. Tells
 * which cards an edit makes stale before the engine has looked. `generation` stands for the content of the files.
 */
export function stepSignatures(recipe: Recipe, generation: number): Map<string, string> {
  const specs = new Map(recipe.steps.map((s) => [s.id, s]));
  const done = new Map<string, string>();
  const visit = (name: string, above: readonly string[]): string => {
    const known = done.get(name);
    if (known !== undefined) return known;
    const spec = specs.get(name);
    if (!spec) {
      const input = Object.hasOwn(recipe.inputs, name) ? recipe.inputs[name] : null;
      return JSON.stringify([name, input, generation]);
    }
    if (above.includes(name)) return 'cycle';
    const of = spec.of.map((n) => visit(n, [...above, name]));
    const params = Object.entries(spec.params).sort(([a], [b]) => (a < b ? -1 : 1));
    const text = JSON.stringify([spec.do, spec.off, params, recipe.sites ?? null, of]);
    done.set(name, text);
    return text;
  };
  return new Map(recipe.steps.map((s) => [s.id, visit(s.id, [])]));
}
