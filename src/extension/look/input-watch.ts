import { basename, dirname, resolve } from 'node:path';
import * as vscode from 'vscode';

/** A file being written changes many times; one run afterwards is enough. */
const SETTLE_MS = 500;

/** A glob that matches a name to the letter. */
const plain = (name: string): string => name.replace(/[[\]{}*?]/g, '[$&]');

/** Watches the data files under a look or a data view and says when one has changed. */
export class InputWatch implements vscode.Disposable {
  readonly #onChange: () => void;
  #watchers: vscode.Disposable[] = [];
  #followed = '';
  #timer: NodeJS.Timeout | undefined;

  constructor(onChange: () => void) {
    this.#onChange = onChange;
  }

  follow(folder: string, files: readonly string[]): void {
    const paths = [...new Set(files.map((f) => resolve(folder, f)))].sort();
    const key = paths.join('\n');
    if (key === this.#followed) return;
    this.#followed = key;
    this.#drop();
    const changed = (): void => {
      clearTimeout(this.#timer);
      this.#timer = setTimeout(this.#onChange, SETTLE_MS);
    };
    this.#watchers = paths.flatMap((path) => {
      const at = new vscode.RelativePattern(vscode.Uri.file(dirname(path)), plain(basename(path)));
      const watcher = vscode.workspace.createFileSystemWatcher(at);
      return [
        watcher,
        watcher.onDidChange(changed),
        watcher.onDidCreate(changed),
        watcher.onDidDelete(changed),
      ];
    });
  }

  #drop(): void {
    for (const w of this.#watchers) w.dispose();
    this.#watchers = [];
  }

  dispose(): void {
    clearTimeout(this.#timer);
    this.#drop();
  }
}
