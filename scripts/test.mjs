// npm test: builds what is missing, runs the unit tests, then the editor suites where an editor is at hand; the last
// line counts both. FRINGESIDE_REQUIRE_EDITOR=1 makes a missing editor a failure (continuous integration).
import { spawnSync } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { buildIfStale } from './build-if-stale.mjs';
import { missingForEditor, root } from './editor-facts.mjs';

const total = { passed: 0, failed: 0, skipped: 0 };
const output = join(root, 'build-output');
mkdirSync(output, { recursive: true });

buildIfStale();
runVitest();
runEditor();
const skipped = total.skipped > 0 ? `, ${total.skipped} skipped` : '';
console.log(`${total.passed} passed, ${total.failed} failed${skipped}`);
process.exitCode = total.failed === 0 && total.passed > 0 ? 0 : 1;

/** The unit tests; a run that breaks without a failed test counts as one failure. */
function runVitest() {
  const file = join(output, 'vitest.json');
  rmSync(file, { force: true });
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${file}`];
  const status = node([
    join(root, 'node_modules/vitest/vitest.mjs'),
    ...['run', '-c', '.config/vitest.config.ts', ...reporters],
  ]);
  const result = read(file) ?? { numPassedTests: 0, numFailedTests: 0, numPendingTests: 0 };
  total.passed += result.numPassedTests;
  total.failed += status === 0 ? result.numFailedTests : Math.max(1, result.numFailedTests);
  total.skipped += result.numPendingTests;
}

/** The editor suites, or the reasons why they do not run. */
function runEditor() {
  const missing = missingForEditor();
  if (missing.length > 0) {
    const required = process.env['FRINGESIDE_REQUIRE_EDITOR'] === '1';
    for (const reason of missing) console.log(`EDITOR SUITES NOT RUN: ${reason}`);
    if (required) total.failed++;
    return;
  }
  const file = join(output, 'editor-results.json');
  rmSync(file, { force: true });
  const status = node([join(root, 'scripts/test-editor.mjs')]);
  const result = read(file) ?? { passed: 0, failed: 0 };
  total.passed += result.passed;
  total.failed += status === 0 ? result.failed : Math.max(1, result.failed);
}

function node(args) {
  return spawnSync(process.execPath, args, { cwd: root, stdio: 'inherit' }).status;
}

function read(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return undefined;
  }
}
