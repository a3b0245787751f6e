import assert from 'node:assert/strict';
import { readFileSync, readdirSync, rmSync } from 'node:fs';
import { basename, join } from 'node:path';
import { until } from '../options';
import { card, cardIn, drawn, lookView, openParameters, parameter, shownNumber, startLook } from '../panel';
import type { EditorSuite } from '../runner';
import { themeNames } from '../workbench';
import { fringeside, seedDemo } from './demo-folder';

interface RunResult {
  readonly steps: readonly { id: string; numbers: readonly { id: string; value: number; unit: string }[] }[];
}

/** From a data file to a look, an edit, and a saved recipe that the command line reruns. */
export const lookSuite: EditorSuite = {
  name: 'look',
  seed: seedDemo,
  async start(workbench) {
    for (const file of recipesIn(workbench.workspace)) rmSync(file);
    const look = await startLook(workbench, 'alder.h5');
    for (const step of ['overview', 'noise']) await cardIn(look, step, 'done');
  },
  tests: {
    'starts from the data view with drawn cards': async (workbench) => {
      const look = await lookView(workbench);
      for (const step of ['overview', 'noise']) await drawn(card(look, step));
      assert.equal(await look.locator('[role=alert]').count(), 0);
      await workbench.screenshot('look-new');
    },

    'shows a figure as text and back': async (workbench) => {
      const look = await lookView(workbench);
      const figure = card(look, 'noise').locator('.figure').first();
      await figure.locator('[data-action="as-text"]').click();
      await figure.locator('table td').first().waitFor();
      await figure.locator('[data-action="as-text"]').click();
      await drawn(figure);
    },

    'computes anew after a changed parameter, and undo takes it back': async (workbench) => {
      const look = await lookView(workbench);
      const before = await shownNumber(look, 'noise', 'resolution');
      await openParameters(look, 'noise');
      const segment = parameter(look, 'noise', 'segment').first();
      await segment.fill('8');
      await segment.press('Enter');
      const after = await until('another resolution', async () => {
        const now = await shownNumber(look, 'noise', 'resolution');
        return now !== before && now;
      });
      assert.ok(Math.abs(parseFloat(before) / parseFloat(after) - 2) < 0.02, `${before}, then ${after}`);
      await cardIn(look, 'noise', 'done');
      await segment.press('Escape');
      await card(look, 'noise').focus();
      await workbench.page.keyboard.press('Control+Z');
      await until('the first resolution', async () => {
        return (await shownNumber(look, 'noise', 'resolution')) === before;
      });
    },

    'saves a recipe that the command line reruns to the same numbers and that opens again': async (
      workbench,
    ) => {
      await cardIn(await lookView(workbench), 'noise', 'done');
      await workbench.runCommand('File: Save');
      const path = await until('the saved recipe', () =>
        recipesIn(workbench.workspace).find((file) => readFileSync(file, 'utf8').includes('noise-spectrum')),
      );
      const result = JSON.parse(fringeside(workbench.root, 'run', path, '--json')) as RunResult;
      const floor = result.steps.find((s) => s.id === 'noise')?.numbers.find((n) => n.id === 'floor');
      assert.ok(floor);
      // the unsaved document gives way to the file, with a page of its own
      await (await workbench.tab(basename(path))).and(workbench.page.locator(':not(.dirty)')).waitFor();
      const saved = await lookView(workbench);
      await cardIn(saved, 'noise', 'done');
      await saved.locator('[data-number="noise.floor"] [data-action="copy"]').click();
      await until(`${floor.value} ${floor.unit} on the clipboard`, async () => {
        const copied = await workbench.page.evaluate(() => navigator.clipboard.readText());
        return copied === `${floor.value} ${floor.unit}`;
      });
      // closed and opened from the Explorer, it is the same look
      const shown = await shownNumber(saved, 'noise', 'floor');
      await workbench.closeAllEditors();
      await workbench.openFile(basename(path));
      const again = await lookView(workbench);
      await cardIn(again, 'noise', 'done');
      assert.equal(await shownNumber(again, 'noise', 'floor'), shown);
    },
  },
};

/** Recipes in the workspace that looks on alder.h5 were saved as. */
const recipesIn = (folder: string): string[] =>
  readdirSync(folder)
    .filter((name) => /^alder.*\.fringe\.json$/.test(name))
    .map((name) => join(folder, name));

/** The demo recipe opened from the Explorer. */
export const demoSuite: EditorSuite = {
  name: 'demo recipe',
  seed: seedDemo,
  async start(workbench) {
    await workbench.openFile('demo.fringe.json');
    await lookView(workbench);
  },
  tests: {
    'opens as a look in which every card is done': async (workbench) => {
      const look = await lookView(workbench);
      const recipe = readFileSync(join(workbench.workspace, 'demo.fringe.json'), 'utf8');
      const steps = [...recipe.matchAll(/"id": "([^"]+)"/g)].map((match) => match[1]);
      assert.ok(steps.length > 3);
      for (const step of steps) await cardIn(look, step, 'done');
    },

    'follows the four kinds of theme': async (workbench) => {
      const look = await lookView(workbench);
      await cardIn(look, 'alder-noise', 'done');
      for (const theme of themeNames) {
        await workbench.setTheme(theme);
        await drawn(card(look, 'alder-noise'));
        await workbench.screenshot(
          `demo-${theme.replace('Default ', '').toLowerCase().replaceAll(' ', '-')}`,
        );
      }
      await workbench.setTheme('Default Light Modern');
    },
  },
};
