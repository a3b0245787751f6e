// Puts a complete VS Code server (the one inside the npm package code-server) under .e2e/server, so that the editor
// tests can drive the real workbench in a browser where the desktop editor cannot be downloaded.
//   node scripts/editor-setup.mjs [--force]
// Only the npm registry is used, and g++/make/python3 for three small addons. Nothing is installed outside .e2e.
import { execFileSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, renameSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { editorFacts, findProgram, root } from './editor-facts.mjs';

const { serverDir, version, vscode } = editorFacts;
const stampFile = join(serverDir, 'ready.json');

// What of the server is compiled here: logging, process watching, and the terminals that tasks run in.
const addons = ['@vscode/spdlog', 'native-watchdog', 'node-pty'];
const stamp = JSON.stringify({ version, vscode, addons });
const ready = existsSync(stampFile) && readFileSync(stampFile, 'utf8').trim() === stamp;
if (ready && !process.argv.includes('--force')) {
  console.log(`editor server: code-server ${version} (VS Code ${vscode}) already in ${serverDir}`);
} else {
  install();
}

/** Builds in a folder beside the final one and renames at the end, so a stopped install never looks finished. */
function install() {
  const building = join(dirname(serverDir), `building-${process.pid}`);
  rmSync(building, { recursive: true, force: true });
  mkdirSync(building, { recursive: true });
  writeFileSync(join(building, 'package.json'), '{"private":true}\n');
  const inside = join(building, 'node_modules/code-server/lib/vscode');
  // --ignore-scripts: the packages' own scripts would download prebuilt binaries.
  npm(building, 'package', ['install', '--ignore-scripts', `code-server@${version}`]);
  npm(inside, 'server modules', ['install', '--ignore-scripts', '--omit=dev', '--no-save']);
  npm(inside, 'addons', ['rebuild', ...addons]);
  symlinkSync('node_modules', join(inside, 'node_modules.asar'));
  linkRipgrep(inside);
  writeFileSync(join(building, 'ready.json'), `${stamp}\n`);
  rmSync(serverDir, { recursive: true, force: true });
  renameSync(building, serverDir);
  console.log(`editor server: code-server ${version} (VS Code ${vscode}) now in ${serverDir}`);
}

/** File and text search call ripgrep, which the editor's package would download: use the machine's own. */
function linkRipgrep(inside) {
  const rg = findProgram(['rg']);
  if (!rg)
    throw new Error('ripgrep (rg) is missing: install it first, on Debian with "apt-get install ripgrep"');
  const bin = join(inside, 'node_modules/@vscode/ripgrep/bin');
  mkdirSync(bin, { recursive: true });
  symlinkSync(rg, join(bin, 'rg'));
}

/** One npm call whose output is shown only when it fails. */
function npm(cwd, what, args) {
  const start = performance.now();
  try {
    execFileSync('npm', [...args, '--no-audit', '--no-fund', '--loglevel', 'error'], {
      cwd,
      env: cleanEnv(),
      stdio: ['ignore', 'pipe', 'pipe'],
      maxBuffer: 1 << 28,
    });
  } catch (error) {
    console.error(String(error.stdout), String(error.stderr));
    throw new Error(`npm ${args.join(' ')} failed in ${cwd}`, { cause: error });
  }
  console.log(`editor server: ${what} ${((performance.now() - start) / 1000).toFixed(1)} s`);
}

/**
 * "npm run" hands its own settings down as npm_config_*; those of this project must not steer the other install. The
 * machine's own nodedir (headers for the addons) is kept.
 */
function cleanEnv() {
  const kept = Object.entries(process.env).filter(
    ([name]) => !/^npm_/i.test(name) || /^npm_config_(nodedir|registry|cache|python)$/i.test(name),
  );
  // One addon's script calls npx, which must not wait for an answer.
  return { ...Object.fromEntries(kept), INIT_CWD: root, npm_config_yes: 'true' };
}
