import { execFileSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { join } from 'node:path';

/** Runs the built command line, as a user does after the two commands of the readme. */
export function fringeside(root: string, ...args: string[]): string {
  return execFileSync(process.execPath, [join(root, 'dist/cli.mjs'), ...args], {
    encoding: 'utf8',
    maxBuffer: 1 << 28,
    stdio: ['ignore', 'pipe', 'pipe'],
  });
}

/** Fills the workspace with the demo data, once for all suites that want it. */
export function seedDemo(workspace: string, root: string): void {
  if (!existsSync(join(workspace, 'demo.fringe.json'))) fringeside(root, 'demo', workspace);
}
