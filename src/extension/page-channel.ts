import * as vscode from 'vscode';
import { pack, unpack, type FromDataPage, type FromLookPage } from '../core/protocol/panel';
import type { Services } from './services';

type WithoutSeq<M> = M extends { readonly seq: number } ? Omit<M, 'seq'> : never;

/** Typed messages to and from one page; numbers what it sends, answers what every page may ask for. */
export class PageChannel<To extends { readonly seq: number }, From extends FromLookPage | FromDataPage> {
  readonly #webview: vscode.Webview;
  readonly subscription: vscode.Disposable;
  #seq = 0;

  constructor(webview: vscode.Webview, services: Services, onMessage: (message: From) => void) {
    this.#webview = webview;
    this.subscription = webview.onDidReceiveMessage((raw: unknown) => {
      const message = unpack(raw) as From;
      if (message.type === 'copy') void copy(message.text, message.what);
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
