import { execFile } from 'node:child_process';
import { join } from 'node:path';
import { promisify } from 'node:util';
import * as vscode from 'vscode';
import { LOOK_VIEW } from './look/documents';
import type { Services } from './services';

/** Writes the demo data into a folder of the workspace and opens its recipe as a look. */
export async function writeDemoData(services: Services): Promise<void> {
  const root = vscode.workspace.workspaceFolders?.[0]?.uri;
  if (!root) {
    void vscode.window.showInformationMessage(
      'Open a folder first: the demo data go into a folder "demo" in it.',
    );
    return;
  }
  const dir = join(root.fsPath, 'demo');
  await vscode.window.withProgress(
    { location: vscode.ProgressLocation.Notification, title: 'Making the demo data (16 MB, invented)' },
    () =>
      // The command line makes them in a process of its own, so the editor stays free.
      promisify(execFile)(process.execPath, [join(services.dist.fsPath, 'cli.mjs'), 'demo', dir], {
        env: { ...process.env, ELECTRON_RUN_AS_NODE: '1' },
      }),
  );
  await vscode.commands.executeCommand(
    'vscode.openWith',
    vscode.Uri.file(join(dir, 'demo.fringe.json')),
    LOOK_VIEW,
  );
}
