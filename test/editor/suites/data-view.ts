import assert from 'node:assert/strict';
import { dataView } from '../panel';
import type { EditorSuite } from '../runner';
import { drawn } from '../panel';
import { seedDemo } from './demo-folder';

/** A data file opened from the Explorer. */
export const dataViewSuite: EditorSuite = {
  name: 'data view',
  seed: seedDemo,
  async start(workbench) {
    await workbench.openFile('alder.h5');
    await dataView(workbench);
  },
  tests: {
    'shows the channels of a double-clicked file with their facts': async (workbench) => {
      const data = await dataView(workbench);
      await data.locator('h1', { hasText: 'alder.h5' }).waitFor();
      await data.locator('[data-channel="/strain"]').waitFor();
      const rate = data.locator('[data-channel-view="/strain"] dl.facts > div', { hasText: '4096 Hz' });
      await rate.first().waitFor();
    },

    'draws a preview of the channel': async (workbench) => {
      const data = await dataView(workbench);
      await drawn(data.locator('[data-channel-view="/strain"]'));
      await workbench.screenshot('data-view');
    },

    'follows the four kinds of theme': async (workbench) => {
      const data = await dataView(workbench);
      await drawn(data.locator('[data-channel-view="/strain"]'));
      const seen = new Set<string>();
      for (const theme of ['Default Dark Modern', 'Default Light Modern', 'Default High Contrast'] as const) {
        await workbench.setTheme(theme);
        seen.add(await data.evaluate(() => getComputedStyle(document.body).backgroundColor));
      }
      await workbench.setTheme('Default Light Modern');
      assert.equal(seen.size, 3);
    },
  },
};
