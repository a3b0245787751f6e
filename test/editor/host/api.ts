import assert from 'node:assert/strict';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import * as vscode from 'vscode';

export type HostTests = Readonly<Record<string, () => Promise<void>>>;

export const folder = (): string => vscode.workspace.workspaceFolders![0].uri.fsPath;

/** Writes a file of the workspace and opens it. */
export async function written(name: string, text: string): Promise<vscode.TextDocument> {
  const path = join(folder(), name);
  writeFileSync(path, text);
  const document = await vscode.workspace.openTextDocument(path);
  await vscode.window.showTextDocument(document);
  return document;
}

/** Position inside the first place of `text`. */
export function at(document: vscode.TextDocument, text: string, into = 2): vscode.Position {
  const offset = document.getText().indexOf(text);
  assert.ok(offset >= 0, `"${text}" is in the document`);
  return document.positionAt(offset + into);
}

/** Asks until the answer is there: providers answer when the extension and its engine are up. */
export async function eventually<T>(what: string, ask: () => Thenable<T | undefined | false>): Promise<T> {
  const end = Date.now() + 60_000;
  for (;;) {
    const answer = await ask();
    if (answer !== undefined && answer !== false) return answer;
    if (Date.now() > end) throw new Error(`no ${what} within 60 s`);
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
}
