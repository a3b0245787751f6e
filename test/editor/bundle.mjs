// Bundles the TypeScript of this folder for the two places where it runs.
import { join } from 'node:path';
import { build } from 'esbuild';
import { root } from '../../scripts/editor-facts.mjs';

const shared = {
  bundle: true,
  platform: 'node',
  target: 'node20',
  sourcemap: 'inline',
  logLevel: 'warning',
  loader: { '.py': 'text' },
};

/** The runner with all suites, an ES module with run(options); packages stay outside. */
export async function bundleRunner(folder) {
  const outfile = join(folder, 'runner.mjs');
  const entryPoints = [join(root, 'test/editor/main.ts')];
  await build({ ...shared, entryPoints, outfile, format: 'esm', packages: 'external' });
  return outfile;
}

/** The suite that the editor loads into its extension host. */
export async function bundleHostSuite(folder) {
  const outfile = join(folder, 'host-suite.cjs');
  const entryPoints = [join(root, 'test/editor/host-suite.ts')];
  await build({ ...shared, entryPoints, outfile, format: 'cjs', external: ['vscode'] });
  return outfile;
}
