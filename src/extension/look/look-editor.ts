import * as vscode from 'vscode';
import type { FromLookPage, ToLookPage } from '../../core/protocol/panel';
import { PageChannel } from '../page-channel';
import { pageHtml, pageOptions } from '../page-html';
import type { Services } from '../services';
import { addStep } from './add-step';
import { applyRecipeEdit } from './documents';
import type { LookSession } from './look-session';
import type { Sessions } from './sessions';

type LookChannel = PageChannel<ToLookPage, FromLookPage>;

/** Shows a recipe as a look. The page can be dropped and rebuilt at any time; all that matters is in the session. */
export class LookEditor implements vscode.CustomTextEditorProvider {
  readonly #services: Services;
  readonly #sessions: Sessions;

  constructor(services: Services, sessions: Sessions) {
    this.#services = services;
    this.#sessions = sessions;
  }

  resolveCustomTextEditor(document: vscode.TextDocument, panel: vscode.WebviewPanel): void {
    const session = this.#sessions.acquire(document);
    const channel: LookChannel = new PageChannel(
      panel.webview,
      document.uri,
      this.#services,
      (message: FromLookPage) => {
        void this.#answer(session, channel, message);
      },
    );
    const subscriptions = [
      channel.subscription,
      session.onDidChange((change) => {
        switch (change.type) {
          case 'all':
            channel.post({ type: 'look', state: session.state() });
            break;
          case 'outline':
            channel.post({ type: 'outline', outline: session.outline() });
            break;
          case 'progress':
            channel.post(change);
            break;
          case 'card': {
            const card = session.cardView(change.id);
            if (card) channel.post({ type: 'card', card });
          }
        }
      }),
      panel.onDidChangeViewState(() => {
        if (panel.active) this.#sessions.activate(session);
        else if (this.#sessions.active === session) this.#sessions.activate(undefined);
      }),
    ];
    panel.onDidDispose(() => {
      for (const s of subscriptions) s.dispose();
      this.#sessions.release(session);
    });
    if (panel.active) this.#sessions.activate(session);
    panel.webview.options = pageOptions(this.#services.dist);
    panel.webview.html = pageHtml(panel.webview, this.#services.dist, 'look', 'Fringeside look');
  }

  async #answer(session: LookSession, channel: LookChannel, message: FromLookPage): Promise<void> {
    switch (message.type) {
      case 'ready':
        session.width = message.width;
        channel.post({ type: 'look', state: session.state() });
        return;
      case 'edit':
        if (message.edit.op === 'add') {
          const id = await addStep(session, message.edit.step);
          if (id !== undefined) channel.post({ type: 'reveal', id });
        } else await applyRecipeEdit(session.document, message.edit);
        return;
      case 'run':
        await session.runNow(true);
        return;
      case 'cancel':
        session.cancel();
        return;
      case 'redraw': {
        const { request, id, fingerprint, viewport } = message;
        try {
          const figures = await session.redraw(id, fingerprint, viewport);
          channel.post({ type: 'figures', request, id, figures });
        } catch (e) {
          const text = e instanceof Error ? e.message : String(e);
          channel.post({ type: 'figures-failed', request, id, message: text });
        }
        return;
      }
      case 'open-text': {
        const at = session.document.positionAt(message.offset);
        await vscode.window.showTextDocument(session.document, {
          viewColumn: vscode.ViewColumn.Beside,
          selection: new vscode.Range(at, at),
        });
      }
    }
  }
}
