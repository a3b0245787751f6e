import { existsSync, statSync } from 'node:fs';
import { homedir } from 'node:os';
import { dirname, isAbsolute, join, relative, resolve } from 'node:path';
import * as vscode from 'vscode';
import { mentionsIn } from './mentions';

/** The first existing file that a path in a document can mean: beside the document, else from a workspace folder. */
export function fileNamed(path: string, document: vscode.Uri): vscode.Uri | undefined {
  const roots = (vscode.workspace.workspaceFolders ?? []).map((f) => f.uri.fsPath);
  const own = ['file', 'vscode-notebook-cell'].includes(document.scheme) ? [dirname(document.fsPath)] : [];
  const plain = path.startsWith('~/') ? join(homedir(), path.slice(2)) : path;
  for (const base of [...own, ...roots]) {
    const full = resolve(base, plain);
    if (existsSync(full) && statSync(full).isFile() && mayRead(full, roots)) return vscode.Uri.file(full);
  }
  return undefined;
}

/** A document from a stranger must not make the editor read outside of the folder. */
function mayRead(path: string, roots: readonly string[]): boolean {
  if (vscode.workspace.isTrusted) return true;
  return roots.some((root) => {
    const way = relative(root, path);
    return !way.startsWith('..') && !isAbsolute(way);
  });
}

/** Data files that a document names and that exist, each once. */
export function filesNamedIn(document: vscode.TextDocument): vscode.Uri[] {
  const found = new Map<string, vscode.Uri>();
  for (let i = 0; i < Math.min(document.lineCount, 5000); i++)
    for (const m of mentionsIn(document.lineAt(i).text)) {
      const uri = m.kind === 'file' ? fileNamed(m.text, document.uri) : undefined;
      if (uri) found.set(uri.fsPath, uri);
    }
  return [...found.values()];
}
