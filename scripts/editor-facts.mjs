// Where the test editor and its browser are, and which version: said once for setup, harness and test runners.
import { accessSync, constants, existsSync } from 'node:fs';
import { delimiter, join } from 'node:path';

export const root = new URL('..', import.meta.url).pathname.replace(/\/$/, '');

export const editorFacts = {
  /** npm package code-server; it carries the VS Code version below, the oldest that the extension supports. */
  version: '4.100.3',
  vscode: '1.100.3',
  serverDir: process.env['FRINGESIDE_EDITOR_SERVER'] ?? join(root, '.e2e/server'),
};

/** Full path of the first of these programs on PATH, or undefined. */
export function findProgram(names) {
  for (const name of names) {
    for (const folder of (process.env['PATH'] ?? '').split(delimiter)) {
      const path = join(folder, name);
      try {
        accessSync(path, constants.X_OK);
        return path;
      } catch {
        // not in this folder
      }
    }
  }
  return undefined;
}

/** Debian's chromium or another Chromium-based browser of the user's (FRINGESIDE_CHROMIUM). */
export function findChromium() {
  return process.env['FRINGESIDE_CHROMIUM'] ?? findProgram(['chromium', 'chromium-browser', 'google-chrome']);
}

/** Everything that keeps the editor suites from running, one sentence each with its remedy; empty when they can. */
export function missingForEditor() {
  const missing = [];
  if (!findChromium())
    missing.push(
      'no Chromium found: install it (Debian: apt-get install chromium) or set FRINGESIDE_CHROMIUM',
    );
  if (!existsSync(join(editorFacts.serverDir, 'ready.json')))
    missing.push(`no editor server in ${editorFacts.serverDir}: run "node scripts/editor-setup.mjs"`);
  return missing;
}
