import * as vscode from 'vscode';

/** "Run · Verify · Open as look" above a recipe that is open as text; a setting turns it off. */
export function recipeLens(): vscode.Disposable {
  const changed = new vscode.EventEmitter<void>();
  return vscode.Disposable.from(
    changed,
    vscode.workspace.onDidChangeConfiguration((e) => {
      if (e.affectsConfiguration('fringeside.recipeLens')) changed.fire();
    }),
    vscode.languages.registerCodeLensProvider(
      { pattern: '**/*.fringe.json' },
      {
        onDidChangeCodeLenses: changed.event,
        provideCodeLenses: (document) => {
          if (!vscode.workspace.getConfiguration('fringeside', document).get<boolean>('recipeLens', true))
            return [];
          const top = new vscode.Range(0, 0, 0, 0);
          const lens = (title: string, command: string, tooltip: string): vscode.CodeLens =>
            new vscode.CodeLens(top, { title, command, tooltip, arguments: [document.uri] });
          return [
            lens('$(run) Run', 'fringeside.openAsLook', 'Runs the recipe and shows its cards'),
            lens('$(check) Verify', 'fringeside.verify', 'Runs the recipe and compares with its "expect"'),
          ];
        },
      },
    ),
  );
}
