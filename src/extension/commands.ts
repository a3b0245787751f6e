import * as vscode from 'vscode';
import { analyse } from './analyse';
import { convertTime } from './convert-time';
import { DATA_ENDINGS, isDataFile } from './data-endings';
import { DATA_VIEWS } from './data/data-editor';
import { addNamedStep, pickStep } from './look/add-step';
import { isRecipe, LOOK_VIEW } from './look/documents';
import type { LookSession } from './look/look-session';
import type { Sessions } from './look/sessions';
import { exportPython } from './recipes/export-python';
import { verifyRecipe } from './recipes/verify-recipe';
import { lookAt } from './scripts/look-at';
import type { Services } from './services';
import { startLookOn } from './start-look';
import { writeDemoData } from './write-demo';

/** Commands generated in package.json, one per step: what follows is the step's id. */
const ADD_STEP = 'addStep.';
/** All commands. Each takes what a menu passes, else the active editor, else asks. */
export function registerCommands(
  services: Services,
  sessions: Sessions,
  contributed: readonly { readonly command: string }[],
): vscode.Disposable[] {
  const register = (id: string, run: (...args: never[]) => unknown): vscode.Disposable =>
    vscode.commands.registerCommand(`fringeside.${id}`, async (...args: unknown[]) => {
      try {
        await run(...(args as never[]));
      } catch (e) {
        services.log.error(e instanceof Error ? e : String(e));
        void vscode.window.showErrorMessage(e instanceof Error ? e.message : String(e));
      }
    });
  const withLook = (run: (session: LookSession) => unknown) => (uri?: vscode.Uri) => {
    const session = (uri && sessions.find(uri)) ?? sessions.active ?? lookOfTab(sessions);
    if (session) return run(session);
    return vscode.window.showInformationMessage(
      'Open a look first: a *.fringe.json file, or Start a Look on a data file.',
    );
  };
  return [
    register('openDataView', async (uri?: vscode.Uri) => {
      const file = uri ?? activeFile() ?? (await askForFile('Open data file'));
      if (!file) return;
      const view = /\.(h5|hdf5)$/i.test(file.path) ? DATA_VIEWS[0] : DATA_VIEWS[1];
      await vscode.commands.executeCommand('vscode.openWith', file, view);
    }),
    register('startLook', async (uri?: vscode.Uri, selected?: readonly vscode.Uri[]) => {
      const files =
        selected && selected.length > 0
          ? selected
          : [uri ?? activeData() ?? (await askForFile('Start a look'))];
      await startLookOn(
        files.filter((f) => f !== undefined),
        services,
      );
    }),
    register('openAsLook', (uri?: vscode.Uri) => reopen(uri ?? activeFile(), LOOK_VIEW)),
    register('openAsText', (uri?: vscode.Uri) => reopen(uri ?? activeFile(), 'default')),
    register(
      'runLook',
      withLook((s) => s.runNow(true)),
    ),
    register(
      'cancelRun',
      withLook((s) => s.cancel()),
    ),
    register('addStep', withLook(pickStep)),
    ...contributed
      .map(({ command }) => command.replace(/^fringeside\./, ''))
      .filter((id) => id.startsWith(ADD_STEP))
      .map((id) =>
        register(id, (uri?: vscode.Uri, selected?: readonly vscode.Uri[]) => {
          const name = id.slice(ADD_STEP.length);
          const files = selected && selected.length > 0 ? selected : [uri ?? activeData()];
          const data = files.filter((f) => f !== undefined && isDataFile(f.path)) as vscode.Uri[];
          return data.length > 0
            ? analyse(data, name, services)
            : withLook((s) => addNamedStep(s, name))(uri);
        }),
      ),
    register('verify', async (uri?: vscode.Uri) => {
      const recipe = uri ?? activeFile();
      if (recipe && isRecipe(recipe)) return verifyRecipe(recipe, services);
      return vscode.window.showInformationMessage('Open a recipe first: its name ends in .fringe.json.');
    }),
    register('exportPython', async (uri?: vscode.Uri) => {
      const recipe = uri ?? activeFile();
      if (recipe && isRecipe(recipe)) return exportPython(recipe, services);
      return vscode.window.showInformationMessage('Open a recipe first: its name ends in .fringe.json.');
    }),
    register('writeDemoData', () => writeDemoData(services)),
    // Behind links in hovers and code actions; not in the palette.
    register('lookAt', (gps: string, document?: string) => lookAt(gps, document, services)),
    register('startLookOn', (uri: string) => startLookOn([vscode.Uri.parse(uri)], services)),
    register('openDataViewOf', (uri: string) =>
      vscode.commands.executeCommand('fringeside.openDataView', vscode.Uri.parse(uri)),
    ),
    register('convertTime', convertTime),
    register('showLog', () => services.log.show()),
  ];
}

async function reopen(uri: vscode.Uri | undefined, view: string): Promise<void> {
  if (!uri || !isRecipe(uri)) {
    void vscode.window.showInformationMessage('Open a recipe first: its name ends in .fringe.json.');
    return;
  }
  await vscode.commands.executeCommand('vscode.openWith', uri, view);
}

/** File of the active editor, whatever kind of editor it is. */
function activeFile(): vscode.Uri | undefined {
  const input = vscode.window.tabGroups.activeTabGroup.activeTab?.input;
  if (input instanceof vscode.TabInputCustom || input instanceof vscode.TabInputText) return input.uri;
  return undefined;
}

function activeData(): vscode.Uri | undefined {
  const uri = activeFile();
  return uri && isDataFile(uri.path) ? uri : undefined;
}

function lookOfTab(sessions: Sessions): LookSession | undefined {
  const uri = activeFile();
  return uri && sessions.find(uri);
}

async function askForFile(label: string): Promise<vscode.Uri | undefined> {
  const folder = vscode.workspace.workspaceFolders?.[0]?.uri;
  const picked = await vscode.window.showOpenDialog({
    openLabel: label,
    filters: { 'Data files': [...DATA_ENDINGS], 'All files': ['*'] },
    ...(folder ? { defaultUri: folder } : {}),
  });
  return picked?.[0];
}
