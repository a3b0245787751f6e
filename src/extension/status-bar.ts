import * as vscode from 'vscode';
import { DATA_VIEWS } from './data/data-editor';
import type { Sessions } from './look/sessions';

/** One item, there only while a data view or a look is the active editor. */
export function statusBar(sessions: Sessions): vscode.Disposable {
  const item = vscode.window.createStatusBarItem('fringeside.status', vscode.StatusBarAlignment.Left, 0);
  item.name = 'Fringeside';
  const show = (): void => {
    const look = sessions.active;
    if (look) {
      const { heads, run, problems } = look.outline();
      const done = heads.filter((h) => h.state === 'done').length;
      const running = heads.find((h) => h.state === 'running');
      if (run.state === 'running') {
        item.text = `$(sync~spin) ${running ? `${running.id} ` : ''}${done} of ${heads.length}`;
        item.tooltip = 'Fringeside is running this look. Click to cancel.';
        item.command = 'fringeside.cancelRun';
      } else {
        // A step that is wrong in the text fails too, and is counted once.
        const bad = Math.max(problems.length, heads.filter((h) => h.state === 'failed').length);
        item.text = bad > 0 ? `$(warning) ${bad} to mend` : `$(graph-line) ${done} of ${heads.length} steps`;
        item.tooltip = 'Fringeside look. Click to run it again.';
        item.command = 'fringeside.runLook';
      }
      item.show();
      return;
    }
    const input = vscode.window.tabGroups.activeTabGroup.activeTab?.input;
    if (input instanceof vscode.TabInputCustom && DATA_VIEWS.includes(input.viewType)) {
      item.text = '$(graph-line) Start a look';
      item.tooltip = 'Fringeside data view. Click to start a look on this file.';
      item.command = 'fringeside.startLook';
      item.show();
    } else item.hide();
  };
  show();
  return vscode.Disposable.from(
    item,
    sessions.onDidChange(show),
    vscode.window.tabGroups.onDidChangeTabs(show),
    vscode.window.tabGroups.onDidChangeTabGroups(show),
  );
}
