import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { NOISE_MODELS } from '../../src/core/noise/models';
import { WINDOW_NAMES } from '../../src/core/kernels/windows-names';
import { Engine } from '../../src/core/recipe/engine';
import { nodeHost } from '../../src/host/node-host';
import { makeSamples, npyBytes } from '../cases/data';
import { python, runPython } from './python';

// Parameters away from their defaults, many in one recipe and one Python process.
const found = python();
const skipped = 'absent' in found;
const interpreter = 'python' in found ? found.python : '';
let work = '';
let engine: Engine;
beforeAll(async () => {
  work = mkdtempSync(join(tmpdir(), 'fringeside-python-'));
  engine = new Engine(await nodeHost(join(process.cwd(), 'dist')));
  const samples = makeSamples({
    rate: 512,
    seconds: 40,
    parts: [
      { kind: 'white', sigma: 1e-21, seed: 31 },
      { kind: 'sine', amplitude: 1e-21, frequency: 60 },
    ],
    defects: [{ kind: 'missing', from: 11, to: 12.5 }],
  });
  writeFileSync(join(work, 'data.npy'), npyBytes(samples));
  writeFileSync(
    join(work, 'curve.txt'),
    '% Hz; density\nfrequency value\n0 1e-23\n10, 1e-22\n60\t4e-23\n250;  6e-23\n',
  );
});
afterAll(() => rmSync(work, { recursive: true, force: true }));

const input = { file: 'data.npy', rate: 512, epoch: '1400000000', unit: 'strain' };
type Steps = readonly Record<string, unknown>[];

async function agrees(steps: Steps, inputs: Record<string, unknown> = { data: input }): Promise<void> {
  const text = JSON.stringify({ fringe: 1, inputs, steps });
  const made = await engine.exportPython(
    { text, folder: work, dataFolder: '.' },
    { event: () => undefined, cancelled: () => false },
  );
  expect([made.diagnostics, made.leftOut]).toEqual([[], []]);
  writeFileSync(join(work, 'look.py'), made.script!);
  const ran = runPython(interpreter, ['-W', 'error', 'look.py'], work);
  expect([ran.code, ran.err]).toEqual([0, '']);
}

const each = skipped ? test.skip : test;

each('noise spectrum: every window, average and detrending', () =>
  agrees(
    WINDOW_NAMES.flatMap((window, k) =>
      ['mean', 'median', 'median-mean'].map((average) => ({
        id: `${window}-${average}`,
        do: 'noise-spectrum',
        of: ['data'],
        window,
        average,
        segment: [1, 0.998046875, 2][k % 3],
        overlap: [0.5, 0.75, 0, 0.62][k % 4],
        detrend: k % 2 === 0 ? 'constant' : 'none',
      })),
    ),
  ),
);

each('noise spectrum: few segments, bands and spans left out', () =>
  agrees([
    { id: 'one', do: 'noise-spectrum', of: ['data'], segment: 27 },
    { id: 'two', do: 'noise-spectrum', of: ['data'], segment: 18, average: 'median-mean' },
    { id: 'low', do: 'noise-spectrum', of: ['data'], low: 20 },
    { id: 'high', do: 'noise-spectrum', of: ['data'], high: 50, segment: 1 },
    {
      id: 'left',
      do: 'noise-spectrum',
      of: ['data'],
      exclude: [0.5, 1.7, [20, 21]],
      low: 30,
      high: 40,
      segment: 1,
    },
  ]),
);

each('reference noise: every model and a curve, alone and over an estimate', () =>
  agrees([
    { id: 'noise', do: 'noise-spectrum', of: ['data'], segment: 1 },
    ...NOISE_MODELS.flatMap(({ id }) => [
      { id: `${id}-alone`, do: 'reference-noise', of: [], curve: id },
      { id: `${id}-over`, do: 'reference-noise', of: ['noise'], curve: id, low: 50, high: 200 },
    ]),
    { id: 'curve-alone', do: 'reference-noise', of: [], curve: 'file', file: 'curve.txt' },
    { id: 'curve-over', do: 'reference-noise', of: ['noise'], curve: 'file', file: 'curve.txt', low: 20 },
    { id: 'power', do: 'reference-noise', of: [], curve: 'file', file: 'curve.txt', holds: 'power density' },
  ]),
);

// Two stretches of one file, said to be of the same time.
const pair = {
  data: { ...input, duration: 18, start: '1400000001' },
  other: { ...input, epoch: '1399999985', start: '1400000000.5', duration: 20, scale: 2 },
};

each('coherence', () =>
  agrees(
    ['hann', 'nuttall', 'boxcar'].flatMap((window, k) => [
      { id: `a${k}`, do: 'coherence', of: ['data', 'other'], window, segment: 1, overlap: 0.25 * k },
      {
        id: `b${k}`,
        do: 'coherence',
        of: ['other', 'data'],
        window,
        segment: 0.5,
        detrend: 'none',
        exclude: [2, 3],
      },
    ]),
    pair,
  ),
);

each('gaussianity', () =>
  agrees(
    ['hann', 'nuttall', 'boxcar'].map((window, k) => ({
      id: `g${k}`,
      do: 'gaussianity',
      of: ['data'],
      window,
      segment: 0.5,
      overlap: 0.25 * k,
      'false-ranges': 2,
      exclude: k === 0 ? [30, 31] : [],
      low: k === 1 ? 40 : null,
      high: k === 2 ? 200 : null,
    })),
  ),
);

each('comparison of two estimates, of other spacing, and of models', () =>
  agrees(
    [
      { id: 'first', do: 'noise-spectrum', of: ['data'], segment: 1 },
      { id: 'second', do: 'noise-spectrum', of: ['other'], segment: 1, average: 'mean', window: 'nuttall' },
      { id: 'coarse', do: 'noise-spectrum', of: ['other'], segment: 0.5 },
      { id: 'model', do: 'reference-noise', of: [] },
      { id: 'curve', do: 'reference-noise', of: [], curve: 'file', file: 'curve.txt' },
      { id: 'same', do: 'compare-noise', of: ['first', 'second'] },
      {
        id: 'finer',
        do: 'compare-noise',
        of: ['first', 'coarse'],
        bands: [30, 100, 100, 255],
        probability: 0.99,
      },
      { id: 'turned', do: 'compare-noise', of: ['coarse', 'first'], low: 15, high: 120, 'false-bins': 1 },
      { id: 'to-model', do: 'compare-noise', of: ['first', 'model'] },
      { id: 'from-curve', do: 'compare-noise', of: ['curve', 'first'] },
      { id: 'no-error', do: 'compare-noise', of: ['curve', 'model'], bands: [20, 60] },
    ],
    pair,
  ),
);

if (skipped) test.skip(`not run: ${found.absent}`, () => undefined);
