import * as vscode from 'vscode';
import type { Services } from '../services';
import { LookSession } from './look-session';

/** Sessions by document; one lives while at least one panel shows it. */
export class Sessions {
  readonly #services: Services;
  readonly #open = new Map<string, { readonly session: LookSession; panels: number }>();
  readonly #changed = new vscode.EventEmitter<void>();
  /** The active look is another one, or its run has moved on. */
  readonly onDidChange = this.#changed.event;
  #active: LookSession | undefined;

  constructor(services: Services) {
    this.#services = services;
  }

  /** The look of the panel that has the focus. */
  get active(): LookSession | undefined {
    return this.#active;
  }

  activate(session: LookSession | undefined): void {
    this.#active = session;
    // Commands that add a step are offered in the palette only while there is a look to add it to.
    void vscode.commands.executeCommand('setContext', 'fringeside.lookActive', session !== undefined);
    this.#changed.fire();
  }

  find(uri: vscode.Uri): LookSession | undefined {
    return this.#open.get(uri.toString())?.session;
  }

  acquire(document: vscode.TextDocument): LookSession {
    const key = document.uri.toString();
    let entry = this.#open.get(key);
    if (!entry) {
      const session = new LookSession(document, this.#services);
      session.onDidChange(() => {
        if (session === this.#active) this.#changed.fire();
      });
      this.#open.set(key, (entry = { session, panels: 0 }));
    }
    entry.panels += 1;
    return entry.session;
  }

  release(session: LookSession): void {
    const key = session.document.uri.toString();
    const entry = this.#open.get(key);
    if (!entry || --entry.panels > 0) return;
    this.#open.delete(key);
    if (this.#active === session) this.activate(undefined);
    session.dispose();
  }

  all(): readonly LookSession[] {
    return [...this.#open.values()].map((e) => e.session);
  }
}
