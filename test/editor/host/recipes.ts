import assert from 'node:assert/strict';
import * as vscode from 'vscode';
import { at, eventually, written, type HostTests } from './api';

const RECIPE = `{
  "fringe": 1,
  "inputs": { "alder": { "file": "alder.h5", "channel": "/strain" } },
  "steps": [
    { "id": "overview", "do": "overview", "of": ["alder"] }
  ],
  "expect": { "overview.rate": { "value": 4096 } }
}
`;

const completions = async (document: vscode.TextDocument, place: string, into: number): Promise<string[]> => {
  const list = await vscode.commands.executeCommand<vscode.CompletionList>(
    'vscode.executeCompletionItemProvider',
    document.uri,
    at(document, place, into),
  );
  return list.items.map((i) => (typeof i.label === 'string' ? i.label : i.label.label));
};

/** What a recipe that is open as text offers, and recipes as tasks. */
export const recipeTests: HostTests = {
  'a recipe as text has Run and Verify above it': async () => {
    const document = await written('as-text.fringe.json', RECIPE);
    const lenses = await eventually('lenses', async () => {
      const found = await vscode.commands.executeCommand<vscode.CodeLens[]>(
        'vscode.executeCodeLensProvider',
        document.uri,
        10,
      );
      return found.length > 0 && found;
    });
    assert.deepEqual(
      lenses.map((l) => l.command?.title.replace(/^\$\(\w+\) /, '')),
      ['Run', 'Verify'],
    );
  },

  'completion knows files, the channels in them, names of data, step ids and parameters': async () => {
    const document = await written('as-text.fringe.json', RECIPE);
    const has = (place: string, into: number, label: string): Promise<string[]> =>
      eventually(`completion ${label}`, async () => {
        const labels = await completions(document, place, into);
        return labels.includes(label) && labels;
      });
    await has('"/strain"', 2, '"/strain"');
    await has('"alder.h5"', 2, '"birch.h5"');
    await has('["alder"]', 2, '"alder"');
    await has('"do": "overview"', 8, '"noise-spectrum"');
  },

  'a misspelt step is marked where it stands, with the near name as a fix': async () => {
    const document = await written(
      'wrong.fringe.json',
      RECIPE.replace('"do": "overview"', '"do": "overwiew"'),
    );
    const problem = await eventually('diagnostic', () =>
      Promise.resolve(vscode.languages.getDiagnostics(document.uri).find((d) => d.source === 'Fringeside')),
    );
    assert.equal(document.getText(problem.range), '"overwiew"');
    const actions = await vscode.commands.executeCommand<vscode.CodeAction[]>(
      'vscode.executeCodeActionProvider',
      document.uri,
      problem.range,
    );
    assert.ok(actions.some((a) => a.title === 'Change to "overview"'));
  },

  'recipes are tasks: verify ends with 0 when the numbers agree and not otherwise': async () => {
    await written('as-text.fringe.json', RECIPE);
    await written('differs.fringe.json', RECIPE.replace('4096 }', '4000 }'));
    const tasks = await eventually('tasks', async () => {
      const found = await vscode.tasks.fetchTasks({ type: 'fringeside' });
      return found.some((t) => t.name === 'verify differs.fringe.json') && found;
    });
    const codeOf = async (name: string): Promise<number | undefined> => {
      const task = tasks.find((t) => t.name === name);
      assert.ok(task, name);
      const ended = new Promise<number | undefined>((resolve) => {
        const listener = vscode.tasks.onDidEndTaskProcess((e) => {
          if (e.execution.task.name !== name) return;
          listener.dispose();
          resolve(e.exitCode);
        });
      });
      await vscode.tasks.executeTask(task);
      return ended;
    };
    assert.equal(await codeOf('verify as-text.fringe.json'), 0);
    assert.equal(await codeOf('verify differs.fringe.json'), 1);
  },
};
