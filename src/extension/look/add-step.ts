import * as vscode from 'vscode';
import type { StepDescription } from '../../core/protocol/engine';
import type { Addable } from '../../core/protocol/panel';
import { freshId, type NewStep } from '../../core/recipe/edit';
import { addableSteps } from './addable';
import { askParams } from './ask-params';
import { applyRecipeEdit } from './documents';
import type { LookSession } from './look-session';

const GROUP_WORDS: Record<Addable['group'], string> = {
  look: 'Look',
  noise: 'Noise',
  condition: 'Condition',
  picture: 'Picture',
  signal: 'Signal',
  search: 'Search',
};

/** Adds a step at the end under an id of its own; gives the id back when the document was changed. */
export async function addStep(session: LookSession, step: NewStep): Promise<string | undefined> {
  const recipe = session.recipe;
  if (!recipe) return undefined;
  const taken = [...Object.keys(recipe.inputs), ...recipe.steps.map((s) => s.id)];
  const id = step.id ?? freshId(step.do, taken);
  return (await applyRecipeEdit(session.document, { op: 'add', step: { ...step, id } })) ? id : undefined;
}

/** Asks which step to add, from those that the recipe's data can feed. */
export async function pickStep(session: LookSession): Promise<void> {
  if (!session.recipe) {
    void vscode.window.showWarningMessage('The recipe cannot be read: mend its text first, then add a step.');
    return;
  }
  const items = addableSteps(session.recipe, session.steps).map((a) => ({
    label: a.title,
    description: `${GROUP_WORDS[a.group]}${a.of.length > 0 ? `, of ${a.of.join(', ')}` : ''}`,
    detail: a.summary,
    step: a,
  }));
  const picked = await vscode.window.showQuickPick(items, {
    title: 'Add a step to the look',
    placeHolder: 'What should be done next?',
    matchOnDescription: true,
    matchOnDetail: true,
  });
  if (picked) await addStep(session, { do: picked.step.do, of: picked.step.of });
}

/** Adds a step by name, with the newest data of each kind it takes, after asking for the parameters that matter most. */
export async function addNamedStep(session: LookSession, name: string): Promise<void> {
  const fit = session.recipe && addableSteps(session.recipe, session.steps).find((a) => a.do === name);
  const step = session.steps.find((s) => s.id === name);
  if (!fit || !step) {
    sayMissing(name, session.steps);
    return;
  }
  const params = await askParams(step);
  if (params) await addStep(session, { do: fit.do, of: fit.of, params });
}

/** Says what a step needs that a recipe has not got. */
export function sayMissing(name: string, steps: readonly StepDescription[]): void {
  const takes = steps.find((s) => s.id === name)?.takes.filter((p) => p.count !== 'optional') ?? [];
  const needs = takes.map((p) => `${p.kind} (${p.help})`).join(' and ');
  void vscode.window.showWarningMessage(
    `${name} was not added: the recipe has nothing to feed it. It needs ${needs}.`,
  );
}
