import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import { Engine } from '../src/core/recipe/engine';
import { nodeHost } from '../src/host/node-host';

// Two 32 s stretches of open strain data (CC BY 4.0), of which the project ships no copy.
const folder = process.env['FRINGESIDE_REAL_DATA'] ?? resolve('../shared/real');
const files = ['site-h-2017-01-04.hdf5', 'site-l-2017-01-04.hdf5'];
const absent = files.filter((f) => !existsSync(join(folder, f)));

if (absent.length > 0) test.skip(`real data not found in ${folder}: ${absent.join(', ')}`, () => undefined);
else
  describe.each(files)('%s', (file) => {
    let engine: Engine;
    beforeAll(async () => {
      engine = new Engine(await nodeHost(join(process.cwd(), 'dist')));
    });

    test('opens without a question: rate, start, span and unit are found, and said where', async () => {
      const { channels } = await engine.describe({ file: join(folder, file) });
      const strain = channels[0];
      expect(strain.name).toBe('/strain/Strain');
      expect(strain.rate?.value).toBe(4096);
      expect(strain.rate?.where).toMatch(/attribute \w+ of \/strain\/Strain/);
      expect(strain.start?.value).toMatchObject({ seconds: 1167559920, nanos: 0 });
      expect(strain.start?.where).toMatch(/attribute \w+ of \/strain\/Strain/);
      expect(strain.unit?.value).toBe('strain');
      expect(strain.length).toBe(32 * 4096);
    });

    test('its noise is near 1e-23 per root Hz at 150 Hz and a mains line stands at 60 Hz (common practice, no source)', async () => {
      const text = JSON.stringify({
        fringe: 1,
        inputs: { data: { file, channel: '/strain/Strain' } },
        steps: [{ id: 'noise', do: 'noise-spectrum', of: ['data'], segment: 4 }],
      });
      const { cards } = await engine.run(
        { text, folder, viewport: { width: 4000 } },
        { event: () => undefined, cancelled: () => false },
      );
      expect(cards.map((c) => [c.state, c.error?.message])).toEqual([['done', undefined]]);
      const line = cards[0].figures[0].traces.find((t) => t.type === 'line' && t.role === 'data');
      if (line?.type !== 'line') throw new Error('no spectrum in the figure');
      const median = (from: number, to: number): number => {
        const inside = [...line.y]
          .filter((_, i) => line.x[i] >= from && line.x[i] < to)
          .sort((a, b) => a - b);
        return inside[inside.length >> 1];
      };
      const peak = Math.max(...[...line.y].filter((_, i) => Math.abs(line.x[i] - 60) <= 0.5));
      expect(median(145, 155)).toBeGreaterThan(1e-23 / 3);
      expect(median(145, 155)).toBeLessThan(3e-23);
      expect(peak).toBeGreaterThan(3 * Math.max(median(54, 58), median(62, 66)));
    });

    test('whitened by its own spectrum it is Gaussian with the variance of the band', async () => {
      const text = JSON.stringify({
        fringe: 1,
        inputs: { data: { file, channel: '/strain/Strain' } },
        steps: [{ id: 'white', do: 'whiten', of: ['data'], high: 1700 }],
      });
      const { cards } = await engine.run(
        { text, folder },
        { event: () => undefined, cancelled: () => false },
      );
      const [card] = cards;
      expect([card.state, card.error?.message]).toEqual(['done', undefined]);
      const number = (id: string): number => card.numbers.find((q) => q.id === id)?.value ?? NaN;
      // 15 segments add 5 %, lines narrower than the filter resolves the rest.
      expect(number('variance') / number('share')).toBeGreaterThan(1);
      expect(number('variance') / number('share')).toBeLessThan(1.2);
      expect(number('p-value')).toBeGreaterThan(0.01);
      expect(Math.abs(number('kurtosis'))).toBeLessThan(0.1);
    });
  });
