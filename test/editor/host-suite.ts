import assert from 'node:assert/strict';
import * as vscode from 'vscode';
import { agentTests } from './host/agent';
import type { HostTests } from './host/api';
import { recipeTests } from './host/recipes';
import { scriptTests } from './host/scripts';

/** Tests that need the vscode API; the editor loads this file into its extension host and calls `run`. */
const id = 'fringeside.fringeside';

const tests: HostTests = {
  'the packaged extension is present and activates': async () => {
    const extension = vscode.extensions.getExtension(id);
    assert.ok(extension, `${id} is not installed`);
    await extension.activate();
    assert.ok(extension.isActive);
  },

  'every command of the manifest is registered': async () => {
    const manifest = vscode.extensions.getExtension(id)?.packageJSON as {
      contributes: { commands: { command: string }[] };
    };
    const known = new Set(await vscode.commands.getCommands(true));
    const missing = manifest.contributes.commands.map((c) => c.command).filter((c) => !known.has(c));
    assert.deepEqual(missing, []);
  },

  ...scriptTests,
  ...recipeTests,
  ...agentTests,
};

/** Runs every test, prints "ok - name" or "not ok - name", rejects when one failed. */
export async function run(): Promise<void> {
  let failed = 0;
  for (const [name, test] of Object.entries(tests)) {
    try {
      await test();
      console.log(`ok - ${name}`);
    } catch (error) {
      failed++;
      console.log(
        `not ok - ${name}: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`,
      );
    }
  }
  console.log(`${Object.keys(tests).length - failed} passed, ${failed} failed`);
  if (failed > 0) throw new Error(`${failed} failed`);
}
