import { readFileSync } from 'node:fs';
import { basename, dirname } from 'node:path';
import * as vscode from 'vscode';
import type { RunResult } from '../../core/protocol/engine';
import { CAUTION, resultText } from '../../host/cli/result-text';
import { fileNamed } from '../scripts/named-files';
import type { Services } from '../services';
import { toolRecipe, type DataRequest, type DataTool } from './tool-recipe';

const WIDTH = 110;

/** Five tools for agents over the same engine. They read, and cannot write anything. */
export function agentTools(services: Services): vscode.Disposable {
  const data = (tool: DataTool): vscode.Disposable =>
    vscode.lm.registerTool<DataRequest>(`fringeside_${tool}`, {
      prepareInvocation: ({ input }) => ({ invocationMessage: `Looking at ${basename(input.file)}` }),
      invoke: async ({ input }, token) => {
        const file = inWorkspace(input.file).fsPath;
        const text = toolRecipe(tool, { ...input, file });
        return answer(await run(text, dirname(file), services, token));
      },
    });
  return vscode.Disposable.from(
    ...(['overview', 'noise', 'map', 'match'] as const).map(data),
    vscode.lm.registerTool<{ recipe: string }>('fringeside_runRecipe', {
      prepareInvocation: ({ input }) => ({ invocationMessage: `Running ${basename(input.recipe)}` }),
      invoke: async ({ input }, token) => {
        const { fsPath } = inWorkspace(input.recipe);
        if (!vscode.workspace.isTrusted)
          throw new Error(
            'The folder is not trusted, so its recipes are not run for an agent. Trust the folder first.',
          );
        return answer(await run(readFileSync(fsPath, 'utf8'), dirname(fsPath), services, token));
      },
    }),
  );
}

/** A file an agent names must lie in the workspace: it may have read that name in a document from a stranger. */
function inWorkspace(path: string): vscode.Uri {
  const roots = vscode.workspace.workspaceFolders ?? [];
  const uri = fileNamed(path, vscode.Uri.file('/'));
  if (!uri) throw new Error(`There is no file ${path} in the workspace.`);
  if (!roots.some((root) => uri.fsPath.startsWith(`${root.uri.fsPath}/`)))
    throw new Error(`${path} is not in the workspace; open its folder to look at it.`);
  return uri;
}

function run(
  text: string,
  folder: string,
  services: Services,
  token: vscode.CancellationToken,
): Promise<RunResult> {
  const abort = new AbortController();
  token.onCancellationRequested(() => abort.abort());
  return services.engine.api.run({ text, folder }, { signal: abort.signal, onEvent: () => undefined });
}

function answer(result: RunResult): vscode.LanguageModelToolResult {
  const problems = result.diagnostics.map((d) => `${d.severity}: ${d.message}\n`).join('');
  const text = result.cards.length > 0 ? resultText(result, WIDTH) : CAUTION;
  return new vscode.LanguageModelToolResult([new vscode.LanguageModelTextPart(`${problems}${text}`)]);
}
