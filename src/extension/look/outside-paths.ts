import { isAbsolute, relative, resolve } from 'node:path';
import type { StepDescription } from '../../core/protocol/engine';
import type { Recipe } from '../../core/recipe/recipe';

/**
 * Files a recipe names that lie outside all of `roots`. In a folder that is not trusted a look may read what lies in
 * the folder, but a document from a stranger must not make the editor read elsewhere.
 */
export function outsidePaths(
  recipe: Recipe,
  folder: string,
  roots: readonly string[],
  steps: readonly StepDescription[],
): string[] {
  const fileParams = (name: string): string[] =>
    Object.entries(steps.find((s) => s.id === name)?.params ?? {})
      .filter(([, p]) => p.kind === 'file')
      .map(([key]) => key);
  const named = [
    ...Object.values(recipe.inputs).map((i) => i.file),
    ...(recipe.sites === undefined ? [] : [recipe.sites]),
    ...recipe.steps.flatMap((s) => fileParams(s.do).map((key) => s.params[key])),
  ].filter((p): p is string => typeof p === 'string' && p !== '');
  const inside = (path: string): boolean =>
    roots.some((root) => {
      const way = relative(root, resolve(folder, path));
      return way !== '..' && !way.startsWith('../') && !way.startsWith('..\\') && !isAbsolute(way);
    });
  return [...new Set(named.filter((p) => !inside(p)))];
}
