// npm run package: packs dist/ and the files that .vscodeignore lets through into build-output/fringeside.vsix.
import { mkdirSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { createVSIX } from '@vscode/vsce';
import { buildIfStale } from './build-if-stale.mjs';
import { root } from './editor-facts.mjs';
import { writeNotices } from './notices.mjs';

export const vsixPath = join(root, 'build-output/fringeside.vsix');

/** Packs what is built; the bundles hold all code, so no node_modules go in. */
export async function packageVsix() {
  writeNotices();
  mkdirSync(dirname(vsixPath), { recursive: true });
  await createVSIX({
    cwd: root,
    packagePath: vsixPath,
    dependencies: false,
    allowMissingRepository: true,
    rewriteRelativeLinks: false,
  });
  return vsixPath;
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  buildIfStale();
  await packageVsix();
}
