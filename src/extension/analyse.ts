import { applyEdits } from 'jsonc-parser';
import type * as vscode from 'vscode';
import { editRecipe, freshId } from '../core/recipe/edit';
import { parseRecipe } from '../core/recipe/parse';
import { sayMissing } from './look/add-step';
import { addableSteps } from './look/addable';
import { askParams } from './look/ask-params';
import type { Services } from './services';
import { startLookOn } from './start-look';

/** Starts a look on data files with one analysis added to its first steps, after asking for the parameters that matter most. */
export async function analyse(files: readonly vscode.Uri[], name: string, services: Services): Promise<void> {
  const steps = await services.engine.steps();
  const step = steps.find((s) => s.id === name);
  if (!step) return;
  const params = await askParams(step);
  if (!params) return;
  await startLookOn(files, services, (text) => {
    const { recipe } = parseRecipe(text);
    // A look begins with these already, and what was asked for goes to the one that is there.
    const there = recipe?.steps.find((s) => s.do === name);
    if (there) return applyEdits(text, editRecipe(text, { op: 'set', step: there.id, params }));
    const fit = recipe && addableSteps(recipe, steps).find((a) => a.do === name);
    if (!recipe || !fit) {
      sayMissing(name, steps);
      return text;
    }
    const taken = [...Object.keys(recipe.inputs), ...recipe.steps.map((s) => s.id)];
    const added = { id: freshId(name, taken), do: name, of: fit.of, params };
    return applyEdits(text, editRecipe(text, { op: 'add', step: added }));
  });
}
