import * as vscode from 'vscode';
import { registerCommands } from './commands';
import { DATA_VIEWS, DataEditor } from './data/data-editor';
import { EngineService } from './engine-service';
import { RecipeDiagnostics } from './look/diagnostics';
import { LOOK_VIEW } from './look/documents';
import { LookEditor } from './look/look-editor';
import { Sessions } from './look/sessions';
import type { Services } from './services';
import { statusBar } from './status-bar';

export function activate(context: vscode.ExtensionContext): void {
  const log = vscode.window.createOutputChannel('Fringeside', { log: true });
  const dist = vscode.Uri.joinPath(context.extensionUri, 'dist');
  const engine = new EngineService(dist.fsPath, log);
  const services: Services = { engine, log, dist };
  const sessions = new Sessions(services);
  const editorOptions = { supportsMultipleEditorsPerDocument: true };
  const data = new DataEditor(services);
  const manifest = context.extension.packageJSON as { contributes: { commands: { command: string }[] } };
  context.subscriptions.push(
    log,
    engine,
    ...DATA_VIEWS.map((view) => vscode.window.registerCustomEditorProvider(view, data, editorOptions)),
    vscode.window.registerCustomEditorProvider(LOOK_VIEW, new LookEditor(services, sessions), editorOptions),
    new RecipeDiagnostics(services),
    statusBar(sessions),
    ...registerCommands(services, sessions, manifest.contributes.commands),
    // A folder that becomes trusted may be read from beyond its own files: looks that waited for it go on.
    vscode.workspace.onDidGrantWorkspaceTrust(() => {
      for (const s of sessions.all()) if (s.run.state === 'held') void s.runNow();
    }),
  );
}
