import { relative } from 'node:path';
import * as vscode from 'vscode';
import { RECIPE_ENDING } from '../look/documents';

interface RecipeTask extends vscode.TaskDefinition {
  readonly type: 'fringeside';
  /** Path relative to the folder. */
  readonly recipe: string;
  readonly command: 'run' | 'verify';
  /** Folder for result.json and report.html, relative to the folder. */
  readonly out?: string;
}

/** Recipes as tasks, so that they run like builds and their problems show like a compiler's. */
export function recipeTasks(dist: string): vscode.Disposable {
  return vscode.tasks.registerTaskProvider('fringeside', {
    provideTasks: async () => {
      const found = await vscode.workspace.findFiles(`**/*${RECIPE_ENDING}`, '**/{node_modules,.*}/**', 200);
      return found.flatMap((uri) => {
        const folder = vscode.workspace.getWorkspaceFolder(uri);
        if (!folder) return [];
        const recipe = relative(folder.uri.fsPath, uri.fsPath);
        return (['run', 'verify'] as const).map((command) =>
          taskOf({ type: 'fringeside', recipe, command }, folder, dist),
        );
      });
    },
    resolveTask: (task) => {
      const definition = task.definition as Partial<RecipeTask>;
      const { scope } = task;
      if (typeof definition.recipe !== 'string' || scope === undefined || typeof scope !== 'object')
        return undefined;
      const made = taskOf({ command: 'run', ...definition } as RecipeTask, scope, dist);
      made.definition = task.definition;
      return made;
    },
  });
}

/** The editor's own Node runs the command line that the extension brings: nothing else needs to be installed. */
function taskOf(definition: RecipeTask, folder: vscode.WorkspaceFolder, dist: string): vscode.Task {
  const { recipe, command, out } = definition;
  const args = [
    `${dist}/cli.mjs`,
    command,
    recipe,
    ...(command === 'run' && out !== undefined ? ['--out', out] : []),
  ];
  const task = new vscode.Task(
    definition,
    folder,
    `${command} ${recipe}`,
    'fringeside',
    new vscode.ProcessExecution(process.execPath, args, {
      cwd: folder.uri.fsPath,
      env: { ELECTRON_RUN_AS_NODE: '1' },
    }),
    '$fringeside',
  );
  task.group = command === 'verify' ? vscode.TaskGroup.Test : vscode.TaskGroup.Build;
  return task;
}
