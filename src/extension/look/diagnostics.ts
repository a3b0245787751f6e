import * as vscode from 'vscode';
import type { Diagnostic } from '../../core/protocol/engine';
import type { Services } from '../services';
import { isRecipe, recipeFolder } from './documents';

const QUIET_MS = 300;
const SUGGESTIONS = new WeakMap<vscode.Diagnostic, readonly string[]>();

/** Problems of open recipes, shown where every editor shows them, with the nearest known name one click away. */
export class RecipeDiagnostics implements vscode.Disposable {
  readonly #services: Services;
  readonly #shown = vscode.languages.createDiagnosticCollection('fringeside');
  readonly #timers = new Map<string, NodeJS.Timeout>();
  readonly #subscriptions: readonly { dispose(): unknown }[];

  constructor(services: Services) {
    this.#services = services;
    this.#subscriptions = [
      this.#shown,
      vscode.workspace.onDidOpenTextDocument((d) => this.#later(d)),
      vscode.workspace.onDidChangeTextDocument((e) => this.#later(e.document)),
      vscode.workspace.onDidCloseTextDocument((d) => {
        clearTimeout(this.#timers.get(d.uri.toString()));
        this.#shown.delete(d.uri);
      }),
      vscode.languages.registerCodeActionsProvider(
        { pattern: '**/*.fringe.json' },
        { provideCodeActions: suggest },
        {
          providedCodeActionKinds: [vscode.CodeActionKind.QuickFix],
        },
      ),
    ];
    for (const d of vscode.workspace.textDocuments) this.#later(d);
  }

  #later(document: vscode.TextDocument): void {
    if (!isRecipe(document.uri)) return;
    const key = document.uri.toString();
    clearTimeout(this.#timers.get(key));
    this.#timers.set(
      key,
      setTimeout(() => void this.#check(document), QUIET_MS),
    );
  }

  async #check(document: vscode.TextDocument): Promise<void> {
    const { version } = document;
    try {
      const text = document.getText();
      const found = await this.#services.engine.api.check({ text, folder: recipeFolder(document.uri) });
      if (document.isClosed || document.version !== version) return;
      this.#shown.set(
        document.uri,
        found.map((d) => toEditor(document, d)),
      );
    } catch (e) {
      this.#services.log.warn(
        `checking ${document.uri.fsPath}: ${e instanceof Error ? e.message : String(e)}`,
      );
    }
  }

  dispose(): void {
    for (const t of this.#timers.values()) clearTimeout(t);
    for (const s of this.#subscriptions) s.dispose();
  }
}

/** One quick fix for each known name near to the wrong one. */
function suggest(
  document: vscode.TextDocument,
  _range: vscode.Range,
  context: vscode.CodeActionContext,
): vscode.CodeAction[] {
  return context.diagnostics.flatMap((d) => {
    const target = wrongName(document, d);
    if (!target) return [];
    return (SUGGESTIONS.get(d) ?? []).map((name, i) => {
      const action = new vscode.CodeAction(`Change to "${name}"`, vscode.CodeActionKind.QuickFix);
      action.edit = new vscode.WorkspaceEdit();
      action.edit.replace(document.uri, target, JSON.stringify(name));
      action.diagnostics = [d];
      action.isPreferred = i === 0;
      return action;
    });
  });
}

/** Place of the name that is wrong: the marked text, or the key before it where the mark is on a parameter's value. */
function wrongName(document: vscode.TextDocument, d: vscode.Diagnostic): vscode.Range | undefined {
  const text = document.getText();
  const start = document.offsetAt(d.range.start);
  const onKey = /^\s*:/.test(text.slice(document.offsetAt(d.range.end)));
  if (d.code !== 'unknown-parameter' || onKey) return text[start] === '"' ? d.range : undefined;
  const key = /"(?:[^"\\]|\\.)*"(?=\s*:\s*$)/.exec(text.slice(0, start));
  if (!key) return undefined;
  const end = key.index + key[0].length;
  return new vscode.Range(document.positionAt(key.index), document.positionAt(end));
}

function toEditor(document: vscode.TextDocument, d: Diagnostic): vscode.Diagnostic {
  const range = new vscode.Range(document.positionAt(d.from), document.positionAt(d.to));
  const severity =
    d.severity === 'error' ? vscode.DiagnosticSeverity.Error : vscode.DiagnosticSeverity.Warning;
  const shown = new vscode.Diagnostic(range, d.message, severity);
  shown.source = 'Fringeside';
  shown.code = d.code;
  SUGGESTIONS.set(shown, d.suggestions);
  return shown;
}
