import assert from 'node:assert/strict';
import { existsSync, readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { writeLarge } from '../../host/large-data';
import { until } from '../options';
import { card, cardIn, dataView, drawn, lookView } from '../panel';
import type { EditorSuite } from '../runner';

/** A file of 600 MB: seen at once, in little memory, and its work stops when told to. */
export const largeFileSuite: EditorSuite = {
  name: 'large file',
  async seed(workspace) {
    await writeLarge(join(workspace, 'large.h5'));
  },
  tests: {
    'is seen, worked on, cancelled and worked on again in bounded memory': async (workbench) => {
      const before = hostMemory(workbench.profile.dir);
      await workbench.openFile('large.h5');
      const data = await dataView(workbench);
      await drawn(data.locator('[data-channel-view="/strain"]'));
      const picture = hostMemory(workbench.profile.dir) - before;
      await data.locator('[data-action="start-look"]').first().click();
      const look = await lookView(workbench);
      await cardIn(look, 'noise', 'running');
      await card(look, 'noise').locator('[data-action="cancel"]').click();
      const began = performance.now();
      await cardIn(look, 'noise', 'cancelled');
      const stopped = performance.now() - began;
      await look.locator('[data-action="run"]').click();
      let most = 0;
      await until('the spectrum of the large file', async () => {
        most = Math.max(most, hostMemory(workbench.profile.dir) - before);
        return look.locator('section[data-card="noise"][data-state="done"]').isVisible();
      });
      await drawn(card(look, 'noise'));
      console.log(
        `# large file: extension host with its worker grew by ${picture.toFixed(0)} MiB to the first picture, by at most ${most.toFixed(0)} MiB to the spectrum; cancelled card after ${stopped.toFixed(0)} ms`,
      );
      assert.ok(picture < 100, `${picture} MiB to the first picture`);
      assert.ok(most < 400, `${most} MiB to the spectrum`);
    },
  },
};

/** MiB of memory that the extension host of this run holds, its engine worker (a thread of it) included. */
function hostMemory(dir: string): number {
  for (const pid of readdirSync('/proc').filter((name) => /^\d+$/.test(name))) {
    const at = (file: string): string => join('/proc', pid, file);
    if (!existsSync(at('cmdline'))) continue;
    try {
      if (!readFileSync(at('cmdline'), 'utf8').includes('--type=extensionHost')) continue;
      if (!readFileSync(at('environ'), 'utf8').includes(dir)) continue;
      return Number(/VmRSS:\s+(\d+)/.exec(readFileSync(at('status'), 'utf8'))![1]) / 1024;
    } catch {
      // it ended in the meantime
    }
  }
  throw new Error('no extension host is running');
}
