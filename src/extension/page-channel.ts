import { dirname, join } from 'node:path';
import * as vscode from 'vscode';
import { pack, unpack, type FromDataPage, type FromLookPage } from '../core/protocol/panel';
import { writeAtomically } from '../host/write-atomically';
import type { Services } from './services';

type WithoutSeq<M> = M extends { readonly seq: number } ? Omit<M, 'seq'> : never;

/** Typed messages to and from one page; numbers what it sends, answers what every page may ask for. */
export class PageChannel<To extends { readonly seq: number }, From extends FromLookPage | FromDataPage> {
  readonly #webview: vscode.Webview;
  readonly subscription: vscode.Disposable;
  #seq = 0;

  /** `document` is what the page shows; pictures are offered to be saved beside it. */
  constructor(
    webview: vscode.Webview,
    document: vscode.Uri,
    services: Services,
    onMessage: (message: From) => void,
  ) {
    this.#webview = webview;
    this.subscription = webview.onDidReceiveMessage((raw: unknown) => {
      const message = unpack(raw) as From;
      if (message.type === 'copy') void copy(message.text, message.what);
      else if (message.type === 'save-picture') void savePicture(document, message.name, message.svg);
      else if (message.type === 'page-error') services.log.error(`page: ${message.message}`);
      else onMessage(message);
    });
  }

  post(message: WithoutSeq<To>): void {
    this.#seq += 1;
    void this.#webview.postMessage(pack({ ...message, seq: this.#seq }));
  }
}

async function copy(text: string, what: string): Promise<void> {
  await vscode.env.clipboard.writeText(text);
  vscode.window.setStatusBarMessage(`Copied ${what}`, 3000);
}

/** Asks where, then writes the picture whole or not at all. Nothing is written in a folder that is not trusted. */
async function savePicture(document: vscode.Uri, name: string, svg: string): Promise<void> {
  if (!vscode.workspace.isTrusted) {
    void vscode.window.showWarningMessage('Pictures are saved once this folder is trusted.');
    return;
  }
  const beside = vscode.Uri.file(join(dirname(document.fsPath), `${name}.svg`));
  const target = await vscode.window.showSaveDialog({
    defaultUri: beside,
    filters: { 'SVG picture': ['svg'] },
  });
  if (!target) return;
  try {
    writeAtomically(target.fsPath, svg);
    vscode.window.setStatusBarMessage(`Saved ${target.fsPath}`, 5000);
  } catch (e) {
    void vscode.window.showErrorMessage(e instanceof Error ? e.message : String(e));
  }
}
