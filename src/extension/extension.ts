import * as vscode from 'vscode';
import { registerCommands } from './commands';
import { DATA_VIEWS, DataEditor } from './data/data-editor';
import { EngineService } from './engine-service';
import { RecipeDiagnostics } from './look/diagnostics';
import { LOOK_VIEW } from './look/documents';
import { LookEditor } from './look/look-editor';
import { Sessions } from './look/sessions';
import { agentTools } from './agent/agent-tools';
import { LooksView } from './recipes/looks-view';
import { RecentRuns } from './recipes/recent-runs';
import { recipeCompletion } from './recipes/recipe-completion';
import { recipeLens } from './recipes/recipe-lens';
import { recipeTasks } from './recipes/recipe-tasks';
import { scriptHelp } from './scripts/script-help';
import type { Services } from './services';
import { statusBar } from './status-bar';

export function activate(context: vscode.ExtensionContext): void {
  const log = vscode.window.createOutputChannel('Fringeside', { log: true });
  const dist = vscode.Uri.joinPath(context.extensionUri, 'dist');
  const engine = new EngineService(dist.fsPath, log);
  const recent = new RecentRuns(context.workspaceState);
  const services: Services = { engine, log, recent, dist };
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
    recent,
    new LooksView(sessions, recent),
    recipeLens(),
    recipeCompletion(services),
    recipeTasks(dist.fsPath),
    scriptHelp(services),
    agentTools(services),
    statusBar(sessions),
    ...registerCommands(services, sessions, manifest.contributes.commands),
    // A folder that becomes trusted may be read from beyond its own files: looks that waited for it go on.
    vscode.workspace.onDidGrantWorkspaceTrust(() => {
      for (const s of sessions.all()) if (s.run.state === 'held') void s.runNow();
    }),
  );
}
