import assert from 'node:assert/strict';
import * as vscode from 'vscode';
import { at, eventually, written, type HostTests } from './api';

const SCRIPT = `import numpy as np
path = "alder.h5"
t0 = 1400000168.42
count = 123456789012
`;

const text = (hovers: readonly vscode.Hover[]): string =>
  hovers
    .flatMap((h) => h.contents)
    .map((c) => (c instanceof vscode.MarkdownString ? c.value : ''))
    .join('\n')
    .replaceAll('&nbsp;', ' ');

const hoverAt = async (document: vscode.TextDocument, place: string): Promise<string> =>
  text(
    await vscode.commands.executeCommand<vscode.Hover[]>(
      'vscode.executeHoverProvider',
      document.uri,
      at(document, place),
    ),
  );

/** What a Python script or a note offers on data files and times. */
export const scriptTests: HostTests = {
  'a data file in a Python script has facts and a spectrum in its hover': async () => {
    const document = await written('analysis.py', SCRIPT);
    const found = await eventually('hover on the file', async () => {
      const hover = await hoverAt(document, 'alder.h5');
      return hover.includes('data:image/svg+xml') && hover;
    });
    assert.match(found, /256\W+s\W+at\W+4096\W+Hz/);
    assert.match(found, /GPS\W+1400000000/);
    assert.match(found, /command:fringeside.startLookOn/);
  },

  'a GPS time has its UTC in the hover, other long numbers have none': async () => {
    const document = await written('analysis.py', SCRIPT);
    const found = await hoverAt(document, '1400000168');
    assert.match(found, /2024/);
    assert.match(found, /command:fringeside.lookAt/);
    assert.ok(!(await hoverAt(document, '123456789012')).includes('fringeside'));
  },

  'notes in Markdown have the same': async () => {
    const document = await written('notes.md', '# Seen\n\nAt GPS 1400000168 in `birch.h5`.\n');
    assert.match(await hoverAt(document, '1400000168'), /2024/);
    assert.match(
      await eventually('hover', async () => (await hoverAt(document, 'birch.h5')) || false),
      /4096/,
    );
  },

  'code actions offer to look, and look there opens a look around the time': async () => {
    const document = await written('analysis.py', SCRIPT);
    const position = at(document, '1400000168');
    const actions = await vscode.commands.executeCommand<vscode.CodeAction[]>(
      'vscode.executeCodeActionProvider',
      document.uri,
      new vscode.Range(position, position),
    );
    const look = actions.find((a) => a.title.startsWith('Look at GPS 1400000168.42'));
    assert.ok(look, actions.map((a) => a.title).join(', '));
    assert.ok(actions.some((a) => a.title.startsWith('Write 2024-')));
    await vscode.commands.executeCommand(look.command!.command, ...(look.command!.arguments as unknown[]));
    const recipe = await eventually('look', () =>
      Promise.resolve(
        vscode.workspace.textDocuments.find(
          (d) => d.uri.path.endsWith('.fringe.json') && d.getText().includes('1400000152.42'),
        ),
      ),
    );
    assert.match(recipe.getText(), /"duration": 32\b/);
    await vscode.commands.executeCommand('workbench.action.revertAndCloseActiveEditor');
  },
};
