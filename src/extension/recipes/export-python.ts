import { basename } from 'node:path';
import * as vscode from 'vscode';
import { recipeFolder } from '../look/documents';
import type { Services } from '../services';

/** Runs a recipe and opens its script in Python as an unsaved document: to be saved beside the recipe, or anywhere with the data's folder as its argument. */
export async function exportPython(uri: vscode.Uri, services: Services): Promise<void> {
  if (!vscode.workspace.isTrusted) {
    void vscode.window.showWarningMessage('Trust the folder to export its recipes.');
    return;
  }
  const name = basename(uri.fsPath);
  const text = (await vscode.workspace.openTextDocument(uri)).getText();
  const made = await vscode.window.withProgress(
    { location: vscode.ProgressLocation.Notification, title: `Exporting ${name}`, cancellable: true },
    (progress, token) => {
      const abort = new AbortController();
      token.onCancellationRequested(() => abort.abort());
      return services.engine.api.exportPython(
        { text, folder: recipeFolder(uri), dataFolder: '.' },
        {
          signal: abort.signal,
          onEvent: (e) => {
            if (e.type === 'running')
              progress.report({ message: `${e.id} ${Math.round(100 * e.fraction)} %` });
          },
        },
      );
    },
  );
  const left = made.leftOut.map((l) => `"${l.id}" (${l.why})`).join(', ');
  if (made.script === undefined) {
    const why = made.diagnostics.find((d) => d.severity === 'error')?.message ?? left;
    void vscode.window.showErrorMessage(`${name} cannot be exported: ${why || 'it has no steps'}`);
    return;
  }
  const document = await vscode.workspace.openTextDocument({ language: 'python', content: made.script });
  await vscode.window.showTextDocument(document);
  if (left !== '') void vscode.window.showWarningMessage(`Left out of the script: ${left}`);
}
