import type { RunResult } from '../core/protocol/engine';
import type { RecipeFile } from './cli/recipe-file';

/** A run's result as JSON: numbers, warnings, tables and provenance; not the pictures, which the recipe makes again. */
export function resultJson(recipe: RecipeFile, result: RunResult): string {
  const cards = result.cards.map(({ figures, ...card }) => ({
    ...card,
    figures: figures.map((f) => ({ id: f.id, title: f.title, caption: f.caption })),
  }));
  return `${JSON.stringify({ result: 1, recipe: recipe.path, engine: result.engine, inputs: result.inputs, diagnostics: result.diagnostics, steps: cards }, null, 2)}\n`;
}
