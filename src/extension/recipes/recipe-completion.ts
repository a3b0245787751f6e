import { basename, resolve } from 'node:path';
import { getLocation } from 'jsonc-parser';
import * as vscode from 'vscode';
import { parseRecipe } from '../../core/recipe/parse';
import type { StepDescription } from '../../core/protocol/engine';
import { DATA_ENDINGS } from '../data-endings';
import { namedKinds } from '../look/addable';
import { recipeFolder } from '../look/documents';
import { channelLine } from '../scripts/file-facts';
import type { Services } from '../services';

/**
 * What the schema cannot know: the channels that are in a file, the names a step may consume, the data files that are there.
 * Step ids and parameters with their units come from the schema.
 */
export function recipeCompletion(services: Services): vscode.Disposable {
  return vscode.languages.registerCompletionItemProvider(
    { pattern: '**/*.fringe.json' },
    { provideCompletionItems: (document, position) => complete(document, position, services) },
    '"',
  );
}

interface Offer {
  readonly value: string;
  readonly detail: string;
  readonly kind: vscode.CompletionItemKind;
}

async function complete(
  document: vscode.TextDocument,
  position: vscode.Position,
  services: Services,
): Promise<vscode.CompletionItem[]> {
  const location = getLocation(document.getText(), document.offsetAt(position));
  if (location.isAtPropertyKey) return [];
  const offers = await offersFor(location.path, document, services);
  const old = location.previousNode;
  const range =
    old?.type === 'string'
      ? new vscode.Range(document.positionAt(old.offset), document.positionAt(old.offset + old.length))
      : undefined;
  return offers.map(({ value, detail, kind }) => {
    const text = JSON.stringify(value);
    const item = new vscode.CompletionItem(text, kind);
    item.detail = detail;
    item.insertText = text;
    item.filterText = text;
    if (range) item.range = range;
    return item;
  });
}

async function offersFor(
  path: readonly (string | number)[],
  document: vscode.TextDocument,
  services: Services,
): Promise<Offer[]> {
  const [part, name, key] = path;
  if (part === 'inputs' && key === 'file') return dataFiles(document);
  const { recipe } = parseRecipe(document.getText());
  if (!recipe) return [];
  if (part === 'inputs' && key === 'channel') {
    const input = Object.entries(recipe.inputs).find(([n]) => n === name)?.[1];
    return input ? channels(resolve(recipeFolder(document.uri), input.file), services) : [];
  }
  if (part === 'steps' && key === 'of') {
    const own = recipe.steps[Number(name)]?.id;
    const steps: readonly StepDescription[] = await services.engine.steps();
    return namedKinds(recipe, steps)
      .filter((n) => n.name !== own)
      .map((n) => ({ value: n.name, detail: n.kind, kind: vscode.CompletionItemKind.Reference }));
  }
  return [];
}

async function channels(file: string, services: Services): Promise<Offer[]> {
  try {
    const description = await services.engine.api.describe({ file });
    return description.channels.map((c) => ({
      value: c.name,
      detail: channelLine(c),
      kind: vscode.CompletionItemKind.Value,
    }));
  } catch {
    return []; // the file that cannot be read is marked already
  }
}

async function dataFiles(document: vscode.TextDocument): Promise<Offer[]> {
  const folder = vscode.Uri.file(recipeFolder(document.uri));
  const found = await vscode.workspace.findFiles(
    new vscode.RelativePattern(folder, `**/*.{${DATA_ENDINGS.join(',')}}`),
    '**/node_modules/**',
    200,
  );
  return found.map((uri) => ({
    value: uri.path.slice(folder.path.length).replace(/^\//, ''),
    detail: basename(uri.path),
    kind: vscode.CompletionItemKind.File,
  }));
}
