import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { installedExtension } from '../profile';
import type { EditorSuite } from '../runner';
import { themeNames } from '../workbench';

interface Manifest {
  readonly version: string;
  readonly displayName: string;
  readonly contributes: {
    readonly commands: readonly { command: string; title: string; category?: string; enablement?: string }[];
    readonly menus?: { readonly commandPalette?: readonly { command: string; when?: string }[] };
  };
}

/** The packaged extension in the real workbench, before any data file is open. */
export const workbenchSuite: EditorSuite = {
  name: 'workbench',
  tests: {
    'lists the installed extension': async (workbench) => {
      const { displayName } = manifest(installedExtension(workbench.profile));
      await workbench.runCommand('View: Show Extensions');
      const view = workbench.page.locator('.extensions-viewlet');
      await view.locator('.extension-list-item .name', { hasText: displayName }).first().waitFor();
      await workbench.runCommand('View: Show Explorer');
    },

    'offers every command that does not depend on a context': async (workbench) => {
      const { contributes } = manifest(installedExtension(workbench.profile));
      const conditional = new Set(contributes.menus?.commandPalette?.map((entry) => entry.command));
      const titles = contributes.commands
        .filter((entry) => entry.enablement === undefined && !conditional.has(entry.command))
        .map((entry) => (entry.category === undefined ? entry.title : `${entry.category}: ${entry.title}`));
      assert.ok(titles.length > 0, 'the manifest contributes no command');
      for (const title of titles) assert.ok(await workbench.offersCommand(title), title);
    },

    'follows the four kinds of theme': async (workbench) => {
      for (const theme of themeNames) await workbench.setTheme(theme);
      await workbench.setTheme('Default Light Modern');
    },
  },
};

const manifest = (folder: string): Manifest =>
  JSON.parse(readFileSync(join(folder, 'package.json'), 'utf8')) as Manifest;
