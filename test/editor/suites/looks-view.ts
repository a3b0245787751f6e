import type { EditorSuite } from '../runner';
import { cardIn, lookView } from '../panel';
import { seedDemo } from './demo-folder';

/** The tree of recipes, and the analyses in the Explorer's menu. */
export const looksViewSuite: EditorSuite = {
  name: 'looks view',
  seed: seedDemo,
  tests: {
    'lists the recipes and, of an open look, its cards with their numbers': async (workbench) => {
      await workbench.runCommand('Explorer: Focus on Looks View');
      const view = workbench.page.locator('.pane', {
        has: workbench.page.getByRole('button', { name: 'Looks Section' }),
      });
      const row = view.locator('.monaco-list-row', { hasText: 'demo.fringe.json' });
      await row.first().dblclick();
      const look = await lookView(workbench);
      await cardIn(look, 'alder-noise', 'done');
      const open = view.locator('.monaco-list-row', { hasText: 'demo.fringe.json' }).first();
      await open.locator('.monaco-tl-twistie').click();
      const card = view.locator('.monaco-list-row', { hasText: 'alder-noise' }).first();
      await card.waitFor();
      await workbench.screenshot('looks-view');
    },

    'an analysis from the menu of a data file starts a look that has it': async (workbench) => {
      await workbench.closeAllEditors();
      await workbench.runCommand('View: Show Explorer');
      const file = workbench.page
        .locator('.explorer-folders-view .monaco-list-row')
        .filter({ hasText: /^alder\.h5$/ })
        .first();
      await file.click({ button: 'right' });
      await workbench.page.getByRole('menuitem', { name: 'Fringeside: Analyse' }).hover();
      await workbench.page.getByRole('menuitem', { name: /Gaussianity/ }).click();
      const look = await lookView(workbench);
      await cardIn(look, 'gaussianity', 'done');
    },
  },
};
