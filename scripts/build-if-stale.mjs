// Builds dist/ when it is missing or older than a source of it.
import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { root } from './editor-facts.mjs';

const sources = ['src', 'webview', 'esbuild.config.mjs', 'package-lock.json'];

/** Runs "npm run build" if needed; ends the process when that fails. */
export function buildIfStale() {
  const built = modified(join(root, 'dist'), /\.(cjs|mjs|js)$/, Math.min);
  const changed = Math.max(...sources.map((name) => modified(join(root, name), /./, Math.max)));
  if (Number.isFinite(built) && built >= changed) return;
  console.log(`dist/ is ${Number.isFinite(built) ? 'older than its sources' : 'missing'}: npm run build`);
  const { status } = spawnSync('npm', ['run', 'build', '--silent'], { cwd: root, stdio: 'inherit' });
  if (status !== 0) {
    console.error('npm run build failed: nothing was tested');
    process.exit(1);
  }
}

/**
 * Newest (Math.max) or oldest (Math.min) modification time of the matching files in a path; infinite when there is none.
 * Of dist/ only the bundles count: the build rewrites them every time, the compiled kernels only when they change.
 */
function modified(path, pattern, pick) {
  if (!existsSync(path)) return pick();
  if (!statSync(path).isDirectory()) return statSync(path).mtimeMs;
  return readdirSync(path, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && pattern.test(entry.name))
    .reduce((time, entry) => pick(time, statSync(join(entry.parentPath, entry.name)).mtimeMs), pick());
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) buildIfStale();
