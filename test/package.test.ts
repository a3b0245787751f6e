import { execFileSync } from 'node:child_process';
import { readFileSync, statSync } from 'node:fs';
import { beforeAll, expect, test } from 'vitest';

const root = new URL('..', import.meta.url).pathname;
let files: string[] = [];

beforeAll(() => {
  execFileSync(process.execPath, ['scripts/build-if-stale.mjs'], { cwd: root });
  execFileSync(process.execPath, ['scripts/notices.mjs'], { cwd: root });
  const vsce = ['node_modules/@vscode/vsce/vsce', 'ls', '--no-dependencies'];
  files = execFileSync(process.execPath, vsce, { cwd: root, encoding: 'utf8' }).trim().split('\n');
}, 180_000);

/** Bounds in kB, about ±50 % of what was measured: a library that slips into a page shows here. */
const bundles: Readonly<Record<string, readonly [low: number, high: number]>> = {
  'dist/extension.cjs': [50, 250],
  'dist/worker.mjs': [4000, 9000],
  'dist/cli.mjs': [4000, 9000],
  'dist/look.js': [30, 150],
  'dist/data.js': [20, 100],
  'dist/plotly.js': [800, 1600],
  'dist/report-plotly.min.js': [3500, 6000],
  'dist/kernels.wasm': [20, 120],
  'dist/report.js': [2, 20],
};

test('the package holds exactly what users need', () => {
  const others = files.filter((file) => !/^media\/(demo|walkthrough)\/|^media\/[^/]+\.png$/.test(file));
  expect(others.sort()).toEqual(
    [
      ...Object.keys(bundles),
      'CHANGELOG.md',
      'LICENSE',
      'README.md',
      'dist/THIRD-PARTY-NOTICES.txt',
      'dist/data.css',
      'dist/look.css',
      'dist/plotly.js.LEGAL.txt',
      'dist/report.css',
      'media/recipe.schema.json',
      'package.json',
    ].sort(),
  );
});

test.each(Object.entries(bundles))('the size of %s stays in its bounds', (file, [low, high]) => {
  const size = statSync(root + file).size / 1000;
  expect(size).toBeGreaterThan(low);
  expect(size).toBeLessThan(high);
});

test('every file that the manifest and the readme point to is in the package', () => {
  const manifest = readFileSync(`${root}package.json`, 'utf8');
  const readme = readFileSync(`${root}README.md`, 'utf8');
  const wanted = [
    ...[...manifest.matchAll(/"(?:\.\/)?((?:dist|media)\/[^"]+)"/g)].map((match) => match[1]),
    ...[...readme.matchAll(/!\[[^\]]*\]\(([^):]+)\)/g)].map((match) => match[1]),
  ];
  expect(wanted.length).toBeGreaterThan(2);
  expect(wanted.filter((file) => !files.includes(file))).toEqual([]);
});

test('the notices name every package in the bundles', () => {
  const notices = readFileSync(`${root}dist/THIRD-PARTY-NOTICES.txt`, 'utf8');
  const bundled =
    readFileSync(`${root}dist/worker.mjs`, 'utf8') + readFileSync(`${root}dist/extension.cjs`, 'utf8');
  // esbuild marks each module that it takes in with the path of its file
  const paths = [...bundled.matchAll(/^\/\/ node_modules\/((?:@[^/\n]+\/)?[^/\n]+)\//gm)];
  const names = new Set(paths.map((match) => match[1]));
  expect(names).toContain('h5wasm');
  for (const name of names) expect(notices).toContain(`\n${name} `);
});
