import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { CancelledError } from '../../src/core/data/errors';
import type { RunResult } from '../../src/core/protocol/engine';
import { WorkerPool } from '../../src/host/worker-pool';
import { npyBytes } from '../cases/data';
import { gaussianNoise } from '../steps/synthetic';

const dist = join(process.cwd(), 'dist');
let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'fringeside-pool-'));
  for (const [k, name] of ['a', 'b'].entries())
    writeFileSync(
      join(folder, `${name}.npy`),
      npyBytes(gaussianNoise(1 << 18, 1, k + 1) as Float64Array<ArrayBuffer>),
    );
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const text = JSON.stringify({
  fringe: 1,
  inputs: {
    a: { file: 'a.npy', rate: 1024 },
    b: { file: 'b.npy', rate: 1024 },
    c: { file: 'a.npy', rate: 512 },
  },
  steps: [
    { id: 'na', do: 'noise-spectrum', of: ['a'] },
    { id: 'nb', do: 'noise-spectrum', of: ['b'] },
    { id: 'oc', do: 'overview', of: ['c'], off: true },
    { id: 'oa', do: 'overview', of: ['a'] },
    { id: 'bad', do: 'noise-spectrum', of: ['b'], segment: 100000 },
  ],
});
/** What must not depend on how the work was spread. */
const essence = (r: RunResult): unknown => ({
  cards: r.cards.map(({ provenance, figures, ...card }) => ({
    ...card,
    print: provenance?.fingerprint,
    figures: figures.length,
  })),
  inputs: r.inputs,
  diagnostics: r.diagnostics,
});

test('two workers give the result of one', async () => {
  const [one, two] = [new WorkerPool(dist, 1), new WorkerPool(dist, 2)];
  try {
    const expected = await one.task((api) => api.run({ text, folder }));
    expect(expected.cards.map((c) => c.state)).toEqual(['done', 'done', 'off', 'done', 'failed']);
    expect(essence(await two.run({ text, folder }))).toEqual(essence(expected));
  } finally {
    await Promise.all([one.dispose(), two.dispose()]);
  }
});

test('more tasks than workers wait their turn, and a failing one does not block the queue', async () => {
  const pool = new WorkerPool(dist, 2);
  try {
    const tasks = Array.from({ length: 7 }, (_, i) =>
      pool.task((api) =>
        i === 2 ? Promise.reject(new Error('a bug')) : api.describe({ file: join(folder, 'a.npy') }),
      ),
    );
    const ends = await Promise.allSettled(tasks);
    expect(ends.map((e) => e.status)).toEqual(ends.map((_, i) => (i === 2 ? 'rejected' : 'fulfilled')));
  } finally {
    await pool.dispose();
  }
});

test('an abort reaches every worker', async () => {
  const pool = new WorkerPool(dist, 2);
  const stop = new AbortController();
  try {
    const run = pool.run({ text, folder }, { signal: stop.signal, onEvent: () => stop.abort() });
    const end = await run.then(
      (r) => r.cards.some((c) => c.state === 'cancelled'),
      (e: unknown) => e instanceof CancelledError,
    );
    expect(end).toBe(true);
  } finally {
    await pool.dispose();
  }
});
