import type { TextDocument } from 'vscode';

type Listener = (event: unknown) => void;
const textListeners = new Set<Listener>();
let trusted = true;
let folder = '/data';
const nothing = { dispose: () => undefined };

class EventEmitter {
  readonly #listeners = new Set<Listener>();
  readonly event = (listener: Listener): { dispose(): void } => {
    this.#listeners.add(listener);
    return { dispose: () => this.#listeners.delete(listener) };
  };
  fire(event: unknown): void {
    for (const l of this.#listeners) l(event);
  }
  dispose(): void {
    this.#listeners.clear();
  }
}

/** The part of the editor's API that a look's session touches. */
export const vscode = {
  EventEmitter,
  RelativePattern: EventEmitter,
  Uri: { file: (path: string) => ({ path, fsPath: path }) },
  workspace: {
    get isTrusted() {
      return trusted;
    },
    get workspaceFolders() {
      return [{ uri: { fsPath: folder } }];
    },
    onDidChangeTextDocument: (listener: Listener) => {
      textListeners.add(listener);
      return { dispose: () => textListeners.delete(listener) };
    },
    createFileSystemWatcher: () => ({
      ...nothing,
      onDidChange: () => nothing,
      onDidCreate: () => nothing,
      onDidDelete: () => nothing,
    }),
  },
};

export const fakes = {
  trust(isTrusted: boolean, workspaceFolder: string): void {
    trusted = isTrusted;
    folder = workspaceFolder;
  },
  /** A document whose edits reach the listeners as the editor's do. */
  document(path: string, text: string): { object: TextDocument; edit: (text: string) => void } {
    let now = text;
    const object = {
      uri: { path, fsPath: path, toString: () => path },
      isUntitled: false,
      getText: () => now,
    } as unknown as TextDocument;
    const edit = (next: string): void => {
      now = next;
      for (const l of textListeners) l({ document: object, contentChanges: [{}] });
    };
    return { object, edit };
  },
};
