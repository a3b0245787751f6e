// npm run test:electron: the host suite in the desktop editor, which is downloaded (once, into .e2e/desktop). For
// machines with internet access; on Linux without a display run it through xvfb-run.
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { runTests } from '@vscode/test-electron';
import { editorFacts, root } from '../../scripts/editor-facts.mjs';
import { buildIfStale } from '../../scripts/build-if-stale.mjs';
import { bundleHostSuite } from './bundle.mjs';

buildIfStale();
const runDir = join(root, '.e2e', `desktop-${process.pid}`);
const workspace = join(runDir, 'workspace');
mkdirSync(workspace, { recursive: true });
process.exitCode = await runTests({
  version: process.env['FRINGESIDE_EDITOR_VERSION'] ?? editorFacts.vscode,
  cachePath: join(root, '.e2e/desktop'),
  extensionDevelopmentPath: root,
  extensionTestsPath: await bundleHostSuite(runDir),
  launchArgs: [workspace, '--disable-workspace-trust', '--user-data-dir', join(runDir, 'user')],
});
