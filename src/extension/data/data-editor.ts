import { basename, dirname } from 'node:path';
import * as vscode from 'vscode';
import { UserError } from '../../core/data/errors';
import type { CardError } from '../../core/protocol/engine';
import type { DataState, FromDataPage, ToDataPage } from '../../core/protocol/panel';
import { InputWatch } from '../look/input-watch';
import { PageChannel } from '../page-channel';
import { pageHtml, pageOptions } from '../page-html';
import type { Services } from '../services';
import { openLook } from '../start-look';

export const DATA_VIEWS: readonly string[] = ['fringeside.data', 'fringeside.dataOption'];

interface DataDocument extends vscode.CustomDocument {
  readonly uri: vscode.Uri;
}

type DataChannel = PageChannel<ToDataPage, FromDataPage>;

/** Shows what is in a data file, without ever changing it. The file is read by the engine, never by the page. */
export class DataEditor implements vscode.CustomReadonlyEditorProvider<DataDocument> {
  readonly #services: Services;

  constructor(services: Services) {
    this.#services = services;
  }

  openCustomDocument(uri: vscode.Uri): DataDocument {
    return { uri, dispose: () => undefined };
  }

  resolveCustomEditor({ uri }: DataDocument, panel: vscode.WebviewPanel): void {
    const file = uri.fsPath;
    let state: DataState | undefined;
    let preview: AbortController | undefined;
    const read = async (): Promise<DataState> => {
      const head = { name: basename(file), path: file };
      if (uri.scheme !== 'file') {
        const message = `Only files on disk can be read, and this one is ${uri.scheme}:. Save a copy and open that.`;
        return { ...head, error: { code: 'not-a-file', message } };
      }
      try {
        return { ...head, description: await this.#services.engine.api.describe({ file }) };
      } catch (e) {
        return { ...head, error: cardError(e) };
      }
    };
    const channel: DataChannel = new PageChannel(
      panel.webview,
      uri,
      this.#services,
      (message: FromDataPage) => {
        switch (message.type) {
          case 'ready':
            if (state === undefined) void refresh();
            else channel.post({ type: 'data', state });
            break;
          case 'preview':
            preview?.abort();
            preview = new AbortController();
            void this.#preview(file, channel, message, preview.signal);
            break;
          case 'start-look': {
            const facts = state?.description?.channels.find((c) => c.name === message.channel);
            if (!facts) break;
            const { answers, span } = message;
            const start = { file, channel: facts, answers, ...(span ? { span } : {}) };
            openLook([start], this.#services).then(undefined, (e: unknown) => {
              void vscode.window.showErrorMessage(`No look was started: ${cardError(e).message}`);
            });
          }
        }
      },
    );
    const refresh = async (): Promise<void> => {
      state = await read();
      channel.post({ type: 'data', state });
    };
    const watch = new InputWatch(() => void refresh());
    watch.follow(dirname(file), [basename(file)]);
    panel.onDidDispose(() => {
      preview?.abort();
      watch.dispose();
      channel.subscription.dispose();
    });
    panel.webview.options = pageOptions(this.#services.dist);
    panel.webview.html = pageHtml(panel.webview, this.#services.dist, 'data', basename(file));
  }

  async #preview(
    file: string,
    channel: DataChannel,
    message: Extract<FromDataPage, { type: 'preview' }>,
    signal: AbortSignal,
  ): Promise<void> {
    const { request, viewport, rate } = message;
    try {
      const figure = await this.#services.engine.api.preview(
        { file, channel: message.channel, viewport, ...(rate === undefined ? {} : { rate }) },
        {
          signal,
          onEvent: ({ fraction }) => channel.post({ type: 'preview-progress', request, fraction }),
        },
      );
      channel.post({ type: 'preview', request, figure });
    } catch (e) {
      if (!signal.aborted) channel.post({ type: 'preview-failed', request, error: cardError(e) });
    }
  }
}

function cardError(e: unknown): CardError {
  if (e instanceof UserError) return { code: e.code, message: e.message };
  if (e instanceof Error) return { code: 'bug', message: e.message, ...(e.stack ? { stack: e.stack } : {}) };
  return { code: 'bug', message: String(e) };
}
