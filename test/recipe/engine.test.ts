import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Card, RunEvent, RunResult } from '../../src/core/protocol/engine';
import { Engine } from '../../src/core/recipe/engine';
import { nodeHost } from '../../src/host/node-host';

/** An NPY file of float64 samples. */
function npy(samples: Float64Array): Uint8Array {
  const text = `{'descr': '<f8', 'fortran_order': False, 'shape': (${samples.length},), }`;
  const header = text.padEnd(Math.ceil((text.length + 11) / 64) * 64 - 11) + '\n';
  const head = Buffer.from(`\x93NUMPY\x01\x00\x00\x00${header}`, 'latin1');
  head.writeUInt16LE(header.length, 8);
  return Buffer.concat([head, Buffer.from(samples.buffer)]);
}

let folder = '';
let engine: Engine;
const rate = 1024;
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'fringeside-engine-'));
  let state = 1;
  const noise = Float64Array.from(
    { length: 16 * rate },
    () => (state = (state * 48271) % 2147483647) / 2147483647 - 0.5,
  );
  const gappy = noise.slice();
  gappy.fill(NaN, 4 * rate, 5 * rate);
  writeFileSync(join(folder, 'noise.npy'), npy(noise));
  writeFileSync(join(folder, 'gappy.npy'), npy(gappy));
  writeFileSync(join(folder, 'broken.npy'), npy(noise).subarray(0, 5000));
  engine = new Engine(await nodeHost(join(process.cwd(), 'dist')));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const recipe = (steps: object[], file = 'noise.npy', input: object = { rate, epoch: '1400000000' }): string =>
  JSON.stringify({ fringe: 1, inputs: { data: { file, ...input } }, steps });
const run = async (
  text: string,
  cancelAfter = Infinity,
): Promise<{ result: RunResult; events: RunEvent[]; card: (id: string) => Card }> => {
  const events: RunEvent[] = [];
  const result = await engine.run(
    { text, folder },
    { event: (e) => events.push(e), cancelled: () => events.length >= cancelAfter },
  );
  return { result, events, card: (id) => result.cards.find((c) => c.id === id)! };
};

describe('Engine', () => {
  test('runs steps in dependency order, keeps document order in the result, and says where facts came from', async () => {
    const { result, events, card } = await run(
      recipe([
        { id: 'against', do: 'reference-noise', of: ['noise'] },
        { id: 'noise', do: 'noise-spectrum', of: ['data'], segment: 2 },
      ]),
    );
    expect(result.diagnostics).toEqual([]);
    expect(result.cards.map((c) => [c.id, c.state])).toEqual([
      ['against', 'done'],
      ['noise', 'done'],
    ]);
    expect(events.filter((e) => e.type === 'card').map((e) => e.card.id)).toEqual(['noise', 'against']);
    expect(result.inputs[0]).toMatchObject({
      name: 'data',
      rate,
      samples: 16 * rate,
      start: '1400000000',
      rateFrom: 'given in the recipe',
    });
    expect(result.inputs[0].sha256).toMatch(/^[0-9a-f]{64}$/);
    expect(card('noise').provenance).toMatchObject({
      step: 'noise-spectrum',
      params: { segment: 2, average: 'median' },
    });
  });

  test('an edit recomputes only what depends on it', async () => {
    const steps = (segment: number): object[] => [
      { id: 'look', do: 'overview', of: ['data'] },
      { id: 'noise', do: 'noise-spectrum', of: ['data'], segment },
    ];
    await run(recipe(steps(1)));
    const { card } = await run(recipe(steps(0.5)));
    expect(card('look').provenance?.cached).toBe(true);
    expect(card('noise').provenance?.cached).toBe(false);
    const again = await run(recipe(steps(1)));
    expect(again.card('noise').provenance?.cached).toBe(true);
  });

  test('the same recipe gives the same numbers, and a changed file other fingerprints', async () => {
    const text = recipe([{ id: 'look', do: 'overview', of: ['data'] }], 'changing.npy');
    writeFileSync(join(folder, 'changing.npy'), npy(Float64Array.from({ length: rate }, (_, i) => i)));
    const first = await run(text);
    writeFileSync(join(folder, 'changing.npy'), npy(Float64Array.from({ length: 2 * rate }, (_, i) => -i)));
    const second = await run(text);
    expect(second.result.inputs[0].sha256).not.toBe(first.result.inputs[0].sha256);
    expect(second.card('look').numbers).not.toEqual(first.card('look').numbers);
  });

  test('a missing rate names the input so that the user can be asked', async () => {
    const { card } = await run(recipe([{ id: 'look', do: 'overview', of: ['data'] }], 'noise.npy', {}));
    expect(card('look')).toMatchObject({ state: 'failed', error: { code: 'needs-rate', input: 'data' } });
  });

  test('one failing step does not stop the others; what waits for it is blocked with the reason', async () => {
    const { card } = await run(
      recipe([
        { id: 'bad', do: 'noise-spectrum', of: ['data'], segment: 1000 },
        { id: 'after', do: 'reference-noise', of: ['bad'] },
        { id: 'look', do: 'overview', of: ['data'] },
      ]),
    );
    expect(card('bad')).toMatchObject({ state: 'failed' });
    expect(card('bad').error?.stack).toBeUndefined();
    expect(card('after')).toMatchObject({ state: 'blocked' });
    expect(card('after').error?.message).toContain('"bad"');
    expect(card('look').state).toBe('done');
  });

  test('diagnostics reach the card of their step', async () => {
    const { result, card } = await run(
      recipe([
        { id: 'noise', do: 'noise-spectum', of: ['data'] },
        { id: 'odd', do: 'noise-spectrum', of: ['data'], segmnt: 4 },
        { id: 'self', do: 'reference-noise', of: ['self'] },
        { id: 'wrong', do: 'noise-spectrum', of: ['nowhere'] },
        { id: 'loud', do: 'noise-spectrum', of: ['data'], overlap: 2 },
      ]),
    );
    const code = (id: string): string | undefined => card(id).error?.code;
    expect([code('noise'), code('odd'), code('self'), code('wrong'), code('loud')]).toEqual([
      'unknown-step',
      'unknown-parameter',
      'cycle',
      'unknown-name',
      'wrong-value',
    ]);
    expect(result.diagnostics.find((d) => d.subject === 'noise')?.suggestions).toEqual(['noise-spectrum']);
    expect(result.diagnostics.find((d) => d.subject === 'odd')?.suggestions).toEqual(['segment']);
  });

  test('spans outside the data, a lying file and a missing file give one error naming the file, and the next run works', async () => {
    const look = [{ id: 'look', do: 'overview', of: ['data'] }];
    for (const [file, input] of [
      ['noise.npy', { rate, start: 1e9 }],
      ['noise.npy', { rate, duration: 17 }],
      ['noise.npy', { rate, channel: 'nope' }],
      ['broken.npy', { rate }],
      ['missing.npy', { rate }],
      ['.', { rate }],
    ] as const) {
      const { card } = await run(recipe(look, file, input));
      expect(card('look').state, file).toBe('failed');
      expect(card('look').error?.code, card('look').error?.message).not.toBe('bug');
      expect(card('look').error?.message).toContain(file === '.' ? 'fringeside-engine' : file);
    }
    expect((await run(recipe(look))).card('look').state).toBe('done');
  });

  test('gaps are in provenance and enter no number', async () => {
    const { result, card } = await run(
      recipe([{ id: 'noise', do: 'noise-spectrum', of: ['data'], segment: 1 }], 'gappy.npy'),
    );
    expect(result.inputs[0]).toMatchObject({
      notFinite: rate,
      gaps: [{ start: '4', seconds: 1 }].map((g) => ({ ...g, start: '1400000004' })),
    });
    for (const n of card('noise').numbers) expect(Number.isFinite(n.value), n.id).toBe(true);
  });

  test('a cancelled run keeps finished cards and marks the rest', async () => {
    const text = recipe(
      [
        { id: 'look', do: 'overview', of: ['data'] },
        { id: 'noise', do: 'noise-spectrum', of: ['data'], segment: 0.25 },
      ],
      'noise.npy',
      { rate, epoch: 7 },
    );
    const { card } = await run(text, 1);
    expect(card('noise').state).toBe('cancelled');
    expect((await run(text)).card('noise').state).toBe('done');
  });

  test('a figure can be drawn again for another viewport until its result is gone', async () => {
    const { card } = await run(recipe([{ id: 'look', do: 'overview', of: ['data'] }]));
    const print = card('look').provenance!.fingerprint;
    const zoomed = await engine.redraw({ fingerprint: print, viewport: { width: 100, x: [1, 2] } });
    expect(zoomed[0].x.range).toEqual([1, 2]);
    await expect(engine.redraw({ fingerprint: 'gone', viewport: { width: 100 } })).rejects.toMatchObject({
      code: 'evicted',
    });
  });
});
