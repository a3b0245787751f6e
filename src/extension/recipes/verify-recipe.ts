import { basename } from 'node:path';
import * as vscode from 'vscode';
import { parseRecipe } from '../../core/recipe/parse';
import { verify, type Verdict } from '../../core/recipe/verify';
import { numberText } from '../../core/figures/number-text';
import { recipeFolder } from '../look/documents';
import type { Services } from '../services';

/** Runs a recipe and compares with its `expect`; each verdict goes to the log, the sum of them to the user. */
export async function verifyRecipe(uri: vscode.Uri, services: Services): Promise<readonly Verdict[]> {
  if (!vscode.workspace.isTrusted) {
    void vscode.window.showWarningMessage(
      'Trust the folder to verify its recipes, or open the recipe as a look.',
    );
    return [];
  }
  const document = await vscode.workspace.openTextDocument(uri);
  const text = document.getText();
  const name = basename(uri.fsPath);
  const expect = parseRecipe(text).recipe?.expect;
  if (!expect || Object.keys(expect).length === 0) {
    void vscode.window.showWarningMessage(
      `${name} has no "expect", so there is nothing to compare with. Numbers go there as "step.number": { "value": …, "rel": … }.`,
    );
    return [];
  }
  const result = await vscode.window.withProgress(
    { location: vscode.ProgressLocation.Notification, title: `Verifying ${name}`, cancellable: true },
    (progress, token) => {
      const abort = new AbortController();
      token.onCancellationRequested(() => abort.abort());
      return services.engine.api.run(
        { text, folder: recipeFolder(uri) },
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
  const verdicts = verify(result, expect);
  for (const v of verdicts) services.log.info(verdictLine(name, v));
  const wrong = verdicts.filter((v) => !v.ok);
  if (wrong.length === 0) {
    void vscode.window.showInformationMessage(`${name}: all ${verdicts.length} numbers agree.`);
    return verdicts;
  }
  const first = wrong[0];
  const show = 'Show All';
  void vscode.window
    .showWarningMessage(
      `${name}: ${wrong.length} of ${verdicts.length} numbers differ, first ${first.key}: ${first.why}.`,
      show,
    )
    .then((picked) => {
      if (picked === show) services.log.show();
    });
  return verdicts;
}

function verdictLine(recipe: string, v: Verdict): string {
  const unit = v.unit === '' ? '' : ` ${v.unit}`;
  const found = v.found === undefined ? 'nothing' : numberText(v.found, 12);
  return `${recipe}: ${v.ok ? 'agrees' : 'DIFFERS'} ${v.key}: found ${found}${unit}, expected ${numberText(v.expected, 12)} ± ${numberText(v.tolerance, 3)}${unit}${v.ok ? '' : ` (${v.why})`}`;
}
