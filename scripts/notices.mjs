// Writes dist/THIRD-PARTY-NOTICES.txt: the licence texts of every package whose code goes into the bundles. Which those
// are is read from the sources' own imports, so a new dependency cannot be forgotten.
import { existsSync, mkdirSync, readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { root } from './editor-facts.mjs';

/** Its run-time support is compiled into dist/kernels.wasm without an import. */
const compiledIn = ['assemblyscript'];

export const noticesPath = join(root, 'dist/THIRD-PARTY-NOTICES.txt');

/** Collects and writes the notices; throws when a package carries no licence text. */
export function writeNotices() {
  const parts = bundledPackages().map((name) => {
    const { version, license } = manifest(name);
    return `${name} ${version} (${license})\n\n${licenceText(name).trim()}\n`;
  });
  mkdirSync(dirname(noticesPath), { recursive: true });
  writeFileSync(
    noticesPath,
    `Fringeside contains code of these packages.\n\n${parts.join(`\n${'-'.repeat(80)}\n\n`)}`,
  );
}

/** Packages that the sources import and the files that the build copies out of packages, by name. */
function bundledPackages() {
  const names = new Set(compiledIn);
  const add = (specifier) => names.add(specifier.split('/', specifier.startsWith('@') ? 2 : 1).join('/'));
  for (const folder of ['src', 'webview'])
    for (const entry of readdirSync(join(root, folder), { recursive: true, withFileTypes: true })) {
      if (!/\.tsx?$/.test(entry.name)) continue;
      const text = readFileSync(join(entry.parentPath, entry.name), 'utf8');
      for (const [, , specifier] of text.matchAll(/\b(from |import |import\()'([@a-z][^'\n]*)'/g))
        if (specifier !== 'vscode' && !specifier.startsWith('node:')) add(specifier);
    }
  const build = readFileSync(join(root, 'esbuild.config.mjs'), 'utf8');
  for (const [, path] of build.matchAll(/node_modules\/([^'"`]+)/g)) add(path);
  // What these packages import themselves goes into the bundles with them.
  for (const name of names)
    for (const inner of compiledIn.includes(name) ? [] : Object.keys(manifest(name).dependencies ?? {}))
      if (existsSync(join(root, 'node_modules', inner))) names.add(inner);
  return [...names].sort();
}

const manifest = (name) => JSON.parse(readFileSync(join(root, 'node_modules', name, 'package.json'), 'utf8'));

/** A package's licence and notice files, or the licence section of its readme. */
function licenceText(name) {
  const folder = join(root, 'node_modules', name);
  if (!existsSync(folder)) throw new Error(`${name} is imported but not installed: npm ci`);
  const files = readdirSync(folder).filter((file) => /^(licen[cs]e|notice|copying)/i.test(file));
  if (files.length > 0) return files.map((file) => readFileSync(join(folder, file), 'utf8')).join('\n');
  const readme = readdirSync(folder).find((file) => /^readme/i.test(file));
  const section =
    readme && /^#+\s*licen[cs]e\s*$([\s\S]+)/im.exec(readFileSync(join(folder, readme), 'utf8'))?.[1];
  if (!section) throw new Error(`no licence text found in ${folder}: add it to scripts/notices.mjs`);
  return section;
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) writeNotices();
