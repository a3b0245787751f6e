// npm run test:editor [-- TEXT]: the suites of test/editor in the real editor, in a Chromium; only those whose name
// holds TEXT, if given. Pictures go to build-output/screenshots.
import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { bundleHostSuite, bundleRunner } from '../test/editor/bundle.mjs';
import { buildIfStale } from './build-if-stale.mjs';
import { editorFacts, findChromium, missingForEditor, root } from './editor-facts.mjs';
import { packageVsix } from './package-vsix.mjs';

const missing = missingForEditor();
if (missing.length > 0) {
  for (const reason of missing) console.error(`editor suites not run: ${reason}`);
  process.exit(1);
}
buildIfStale();
const vsix = await packageVsix();
const runDir = join(root, '.e2e', `run-${process.pid}`);
const bundles = join(root, '.e2e', `bundle-${process.pid}`);
mkdirSync(bundles, { recursive: true });
process.once('exit', () => {
  for (const folder of [runDir, bundles]) rmSync(folder, { recursive: true, force: true });
});
for (const signal of ['SIGINT', 'SIGTERM']) process.once(signal, () => process.exit(130));

const { run } = await import(pathToFileURL(await bundleRunner(bundles)).href);
const outDir = join(root, 'build-output');
const tally = await run({
  root,
  serverDir: editorFacts.serverDir,
  chromium: findChromium(),
  vsix,
  runDir,
  hostSuite: await bundleHostSuite(bundles),
  outDir,
  filter: process.argv[2] ?? '',
});
writeFileSync(join(outDir, 'editor-results.json'), JSON.stringify(tally) + '\n');
process.exit(tally.failed === 0 && tally.passed > 0 ? 0 : 1);
