import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { build } from 'esbuild';
import h5wasm from 'h5wasm/node';
import { afterAll, beforeAll, expect, test } from 'vitest';

let folder = '';
beforeAll(() => (folder = mkdtempSync(join(tmpdir(), 'fringeside-large-'))));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** 600 MB of float64 samples in chunks, written block by block. */
async function writeLarge(path: string): Promise<void> {
  await h5wasm.ready;
  const rate = 16384;
  const block = 1 << 20;
  const blocks = 72;
  const file = new h5wasm.File(path, 'w');
  const x = new Float64Array(block);
  let s = 1;
  const fill = (): Float64Array => {
    for (let i = 0; i < block; i++) {
      s = (Math.imul(s, 1664525) + 1013904223) >>> 0;
      x[i] = (s / 2 ** 32 - 0.5) * 1e-21;
    }
    return x;
  };
  const data = file.create_dataset({
    name: 'strain',
    data: fill(),
    maxshape: [block * blocks],
    chunks: [65536],
    dtype: '<d',
  });
  data.create_attribute('sample rate (Hz)', rate);
  data.create_attribute('unit', 'strain');
  data.resize([block * blocks]);
  for (let k = 1; k < blocks; k++) data.write_slice([[k * block, (k + 1) * block]], fill());
  file.close();
}

test('a 600 MB file: the first picture and a look in bounded memory', async () => {
  const path = join(folder, 'large.h5');
  await writeLarge(path);
  expect(statSync(path).size).toBeGreaterThan(600e6);
  const child = join(folder, 'child.mjs');
  await build({
    entryPoints: ['test/host/large-file.child.ts'],
    bundle: true,
    platform: 'node',
    format: 'esm',
    outfile: child,
    logLevel: 'error',
  });
  const out = execFileSync(process.execPath, [child, path, join(process.cwd(), 'dist')], {
    encoding: 'utf8',
  });
  const found = JSON.parse(out) as {
    points: number;
    states: string[];
    hostGrowth: number;
    previewGrowth: number;
    growth: number;
  };
  console.log(
    `memory growth in MiB: to the first picture ${found.previewGrowth.toFixed(0)}, to the spectrum ${found.growth.toFixed(0)}, main thread ${found.hostGrowth.toFixed(1)}`,
  );
  expect(found.states).toEqual(['done', 'done']);
  expect(found.points).toBeGreaterThan(900);
  expect(found.hostGrowth).toBeLessThan(100);
  expect(found.growth).toBeLessThan(300);
}, 300_000);
