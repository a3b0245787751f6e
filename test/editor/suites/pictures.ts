import assert from 'node:assert/strict';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { card, cardIn, drawn, lookView } from '../panel';
import type { EditorSuite } from '../runner';
import { themeNames } from '../workbench';
import { seedDemo } from './demo-folder';

const RECIPE = {
  fringe: 1,
  inputs: { birch: { file: 'birch.h5', channel: '/strain', start: '1400000088', duration: 16 } },
  steps: [
    { id: 'map', do: 'constant-q-map', of: ['birch'] },
    { id: 'lines', do: 'lines', of: ['birch'], segment: 2 },
  ],
};

/** Maps drawn from our own pixels, and steps that go on from what a card shows. */
export const picturesSuite: EditorSuite = {
  name: 'pictures',
  seed(workspace, root) {
    seedDemo(workspace, root);
    writeFileSync(join(workspace, 'pictures.fringe.json'), JSON.stringify(RECIPE, null, 2));
  },
  async start(workbench) {
    await workbench.openFile('pictures.fringe.json');
    const look = await lookView(workbench);
    for (const step of ['map', 'lines']) await cardIn(look, step, 'done');
  },
  tests: {
    'a map is drawn with its loud tiles in four themes': async (workbench) => {
      const look = await lookView(workbench);
      const map = card(look, 'map');
      await drawn(map);
      assert.equal(await map.locator('.imagelayer image').count(), 1);
      for (const theme of themeNames) {
        await workbench.setTheme(theme);
        await drawn(map);
        await workbench.screenshot(`map-${theme.replace('Default ', '').toLowerCase().replaceAll(' ', '-')}`);
      }
      await workbench.setTheme('Default Light Modern');
    },

    'one click notches the lines that were found': async (workbench) => {
      const look = await lookView(workbench);
      await card(look, 'lines').locator('[data-offer="notch"]').click();
      const notch = await cardIn(look, 'notch', 'done');
      await drawn(notch);
      await workbench.screenshot('notch');
    },

    'a zoomed stretch of time becomes a step on it': async (workbench) => {
      const look = await lookView(workbench);
      const map = card(look, 'map');
      const plot = map.locator('.plot-frame').first();
      await plot.focus();
      for (let i = 0; i < 3; i++) await workbench.page.keyboard.press('+');
      await map.locator('[data-offer="spectrogram"]').click();
      const spectrogram = await cardIn(look, 'spectrogram', 'done');
      await drawn(spectrogram);
      assert.match(await spectrogram.locator('.sentence').innerText(), /Spectrogram of \d/);
    },
  },
};
