import assert from 'node:assert/strict';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { cardIn, dataView, drawn, lookView, shownNumber } from '../panel';
import type { EditorSuite } from '../runner';

/** A file that does not say how fast it was sampled: the page asks, and takes the answer into the look. */
export const missingRateSuite: EditorSuite = {
  name: 'missing rate',
  seed(workspace) {
    let s = 7;
    const next = (): number => (s = (Math.imul(s, 1664525) + 1013904223) >>> 0) / 2 ** 32 - 0.5;
    const rows = Array.from({ length: 16_384 }, () => next().toFixed(6));
    writeFileSync(join(workspace, 'one-column.txt'), `${rows.join('\n')}\n`);
  },
  async start(workbench) {
    await workbench.openFile('one-column.txt');
    await workbench.tab('one-column.txt');
    await workbench.runCommand('Fringeside: Open Data View');
    await dataView(workbench);
  },
  tests: {
    'is asked for, refused when senseless, and then used': async (workbench) => {
      const data = await dataView(workbench);
      const form = data.locator('[data-ask="rate"]');
      await form.waitFor();
      assert.equal(await data.locator('[data-action="start-look"]').first().isDisabled(), true);
      const rate = form.locator('[data-param="rate"]');
      await rate.fill('-3');
      await form.locator('[data-action="answer"]').click();
      await form.locator('[role=alert]').waitFor();
      await rate.fill('1024');
      await form.locator('[data-action="answer"]').click();
      await data.locator('dl.facts > div', { hasText: '1024 Hz' }).first().waitFor();
      await drawn(data.locator('[data-channel-view]').first());
      await data.locator('[data-action="start-look"]').first().click();
      const look = await lookView(workbench);
      await cardIn(look, 'noise', 'done');
      assert.match(await shownNumber(look, 'overview', 'rate'), /^1.?024 Hz$/);
    },
  },
};
