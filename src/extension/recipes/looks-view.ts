import { basename } from 'node:path';
import * as vscode from 'vscode';
import type { CardHead, CardView } from '../../core/protocol/panel';
import { quantityText } from '../../core/figures/quantity-text';
import type { Sessions } from '../look/sessions';
import type { RecentRun, RecentRuns } from './recent-runs';

type Node =
  | { readonly type: 'folder'; readonly title: string; readonly nodes: readonly Node[] }
  | { readonly type: 'recipe'; readonly uri: vscode.Uri }
  | { readonly type: 'card'; readonly uri: vscode.Uri; readonly id: string }
  | { readonly type: 'number'; readonly text: string }
  | { readonly type: 'run'; readonly run: RecentRun };

const RECIPES = '**/*.fringe.json';
const SKIPPED = '**/{node_modules,.*}/**';
const MOST = 500;

const STATE_ICONS: Readonly<Record<CardHead['state'], string>> = {
  waiting: 'circle-outline',
  running: 'sync~spin',
  done: 'pass',
  failed: 'error',
  cancelled: 'circle-slash',
  stale: 'history',
  off: 'circle-slash',
  blocked: 'debug-disconnect',
};

/** Recipes of the workspace with the cards of those that are open, and what was run lately. */
export class LooksView implements vscode.TreeDataProvider<Node>, vscode.Disposable {
  readonly #sessions: Sessions;
  readonly #recent: RecentRuns;
  readonly #changed = new vscode.EventEmitter<undefined>();
  readonly onDidChangeTreeData = this.#changed.event;
  readonly #subscriptions: vscode.Disposable;
  #recipes: readonly vscode.Uri[] | undefined;

  constructor(sessions: Sessions, recent: RecentRuns) {
    this.#sessions = sessions;
    this.#recent = recent;
    const watcher = vscode.workspace.createFileSystemWatcher(RECIPES, false, true, false);
    const again = (): void => {
      this.#recipes = undefined;
      this.#changed.fire(undefined);
    };
    this.#subscriptions = vscode.Disposable.from(
      this.#changed,
      watcher,
      watcher.onDidCreate(again),
      watcher.onDidDelete(again),
      vscode.workspace.onDidChangeWorkspaceFolders(again),
      sessions.onDidChange(() => this.#changed.fire(undefined)),
      recent.onDidChange(() => this.#changed.fire(undefined)),
      vscode.window.registerTreeDataProvider('fringeside.looks', this),
    );
  }

  async getChildren(node?: Node): Promise<Node[]> {
    if (!node) {
      this.#recipes ??= await vscode.workspace.findFiles(RECIPES, SKIPPED, MOST);
      const open = this.#sessions.all().map((s) => s.document.uri);
      const known = new Map([...open, ...this.#recipes].map((uri) => [uri.fsPath, uri]));
      const recipes = [...known.values()].sort((a, b) => a.fsPath.localeCompare(b.fsPath));
      const runs = this.#recent.all().map((run): Node => ({ type: 'run', run }));
      const looks = recipes.map((uri): Node => ({ type: 'recipe', uri }));
      return runs.length === 0 ? looks : [...looks, { type: 'folder', title: 'Recent runs', nodes: runs }];
    }
    switch (node.type) {
      case 'folder':
        return [...node.nodes];
      case 'recipe':
        return (this.#sessions.find(node.uri)?.outline().heads ?? []).map((h) => ({
          type: 'card',
          uri: node.uri,
          id: h.id,
        }));
      case 'card':
        return (this.#card(node)?.card?.numbers ?? []).map((q) => {
          const { value, unit } = quantityText(q);
          return { type: 'number', text: `${q.label}: ${value}${unit === '' ? '' : ` ${unit}`}` };
        });
      default:
        return [];
    }
  }

  #card({ uri, id }: { readonly uri: vscode.Uri; readonly id: string }): CardView | undefined {
    return this.#sessions.find(uri)?.cardView(id);
  }

  getTreeItem(node: Node): vscode.TreeItem {
    const { Collapsed, None } = vscode.TreeItemCollapsibleState;
    switch (node.type) {
      case 'folder':
        return new vscode.TreeItem(node.title, Collapsed);
      case 'recipe': {
        const open = this.#sessions.find(node.uri) !== undefined;
        const item = new vscode.TreeItem(node.uri, open ? Collapsed : None);
        item.label = basename(node.uri.fsPath);
        item.description = vscode.workspace.asRelativePath(node.uri).replace(/[^/]*$/, '') || true;
        item.contextValue = 'recipe';
        item.command = openLookCommand(node.uri);
        return item;
      }
      case 'card': {
        const card = this.#card(node);
        const item = new vscode.TreeItem(node.id, card?.card ? Collapsed : None);
        item.description = card ? `${card.title}, ${card.state}` : '';
        item.iconPath = new vscode.ThemeIcon(STATE_ICONS[card?.state ?? 'waiting']);
        item.tooltip = card?.card?.sentence ?? '';
        return item;
      }
      case 'number':
        return new vscode.TreeItem(node.text, None);
      case 'run': {
        const { run } = node;
        const item = new vscode.TreeItem(basename(run.path), None);
        item.description = `${run.done} of ${run.steps} steps, ${run.warnings} ${run.warnings === 1 ? 'warning' : 'warnings'}, ${new Date(run.at).toLocaleString()}`;
        item.tooltip = run.path;
        item.iconPath = new vscode.ThemeIcon(run.done === run.steps ? 'pass' : 'warning');
        item.command = openLookCommand(vscode.Uri.file(run.path));
        return item;
      }
    }
  }

  dispose(): void {
    this.#subscriptions.dispose();
  }
}

const openLookCommand = (uri: vscode.Uri): vscode.Command => ({
  title: 'Open as Look',
  command: 'fringeside.openAsLook',
  arguments: [uri],
});
