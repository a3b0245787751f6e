import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { build } from 'esbuild';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { writeLarge } from './large-data';

let folder = '';
beforeAll(() => (folder = mkdtempSync(join(tmpdir(), 'fringeside-large-'))));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

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
    loader: { '.py': 'text' },
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
