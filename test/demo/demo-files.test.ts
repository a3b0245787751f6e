import { mkdtempSync, readFileSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { formatGps } from '../../src/core/data/gps-time';
import { DEMO_SITES } from '../../src/core/demo/scenario';
import { synthesise } from '../../src/core/demo/synthesise';
import { parseRecipe } from '../../src/core/recipe/parse';
import { parseSites } from '../../src/core/sites/sites';
import { writeDemo, type DemoFile } from '../../src/host/demo-files';
import { samplesSha256 } from '../../src/host/demo-strain';
import { openDataFile } from '../../src/host/open-file';

const top = mkdtempSync(join(tmpdir(), 'fringeside-demo-'));
const dir = join(top, 'made', 'for-it');
const text = (name: string): string => readFileSync(join(dir, name), 'utf8');
const data = DEMO_SITES.map(synthesise);
let files: DemoFile[];
beforeAll(async () => void (files = await writeDemo(dir, data)));
afterAll(() => rmSync(top, { recursive: true }));

const NAMES = [
  'alder-noise.txt',
  'alder.h5',
  'birch-noise.txt',
  'birch.h5',
  'demo.fringe.json',
  'demo.sites.json',
  'demo.truth.json',
];

test('all files are there, nothing else, and each is reported with its hash', () => {
  expect(readdirSync(dir).sort()).toEqual(NAMES);
  expect(files.map((f) => f.name).sort()).toEqual(NAMES);
  expect(files.every((f) => f.written)).toBe(true);
});

test.each(['alder', 'birch'])(
  '%s.h5 says its rate, start and unit, and holds the samples of the hash',
  (name) => {
    const file = openDataFile(join(dir, `${name}.h5`));
    const [channel, ...others] = file.channels;
    expect(others).toEqual([]);
    expect(channel.name).toBe('/strain');
    expect(channel.type).toBe('float64');
    expect(channel.rate?.value).toBe(4096);
    expect(formatGps(channel.start!.value)).toBe('1400000000');
    expect(channel.unit?.value).toBe('strain');
    const samples = new Float64Array(channel.length);
    file.read('/strain', 0, samples.length, samples);
    file.close();
    expect(samplesSha256(samples)).toBe(files.find((f) => f.name === `${name}.h5`)!.sha256);
  },
);

test('the sites file is the scenario’s sites', () => {
  expect(parseSites(text('demo.sites.json'), 'demo.sites.json')).toEqual(DEMO_SITES.map((d) => d.site));
});

test('the recipe parses without a complaint and names files of the demo', () => {
  const { recipe, diagnostics } = parseRecipe(text('demo.fringe.json'));
  expect(diagnostics).toEqual([]);
  const named = [
    recipe!.sites!,
    ...Object.values(recipe!.inputs).map((i) => i.file),
    ...recipe!.steps.flatMap((s) => (typeof s.params['file'] === 'string' ? [s.params['file']] : [])),
  ];
  expect(NAMES).toEqual(expect.arrayContaining(named));
});

test('the truth states lines, gap, glitch and signal', () => {
  const truth = JSON.parse(text('demo.truth.json')) as {
    signal: { networkSnr: number };
    sites: Record<
      string,
      {
        lines: { frequencyHz: number }[];
        gaps: unknown[];
        glitches: unknown[];
        signal: { coalescenceGps: string };
      }
    >;
  };
  expect(truth.signal.networkSnr).toBeCloseTo(17.987, 3);
  expect(truth.sites['alder'].lines).toHaveLength(9);
  expect(truth.sites['birch'].lines).toHaveLength(8);
  expect(truth.sites['alder'].gaps).toEqual([{ startGps: '1400000041', durationSeconds: 3 }]);
  expect(truth.sites['birch'].glitches).toHaveLength(1);
  expect(truth.sites['alder'].signal.coalescenceGps).toBe('1400000168.415984199');
});

describe('a second time', () => {
  test('files with the same content are left alone, a missing one is written again', async () => {
    rmSync(join(dir, 'birch.h5'));
    const before = statSync(join(dir, 'alder.h5')).mtimeMs;
    const again = await writeDemo(dir, data);
    expect(again.filter((f) => f.written).map((f) => f.name)).toEqual(['birch.h5']);
    expect(statSync(join(dir, 'alder.h5')).mtimeMs).toBe(before);
    expect(readdirSync(dir).sort()).toEqual(NAMES);
  });

  test.each(['demo.fringe.json', 'alder.h5'])(
    'a %s that differs stops it before anything is written',
    async (name) => {
      const kept = readFileSync(join(dir, name));
      writeFileSync(join(dir, name), 'mine');
      rmSync(join(dir, 'demo.truth.json'));
      await expect(writeDemo(dir, data)).rejects.toMatchObject({
        name: 'UserError',
        code: 'demo-differs',
        where: join(dir, name),
      });
      expect(readFileSync(join(dir, name), 'utf8')).toBe('mine');
      expect(readdirSync(dir)).not.toContain('demo.truth.json');
      writeFileSync(join(dir, name), kept);
      await writeDemo(dir, data);
    },
  );

  test('one changed sample is a difference', async () => {
    const path = join(dir, 'birch.h5');
    const bytes = readFileSync(path);
    const changed = Uint8Array.from(bytes);
    changed[changed.length >> 1] ^= 1;
    writeFileSync(path, changed);
    await expect(writeDemo(dir, data)).rejects.toMatchObject({ code: 'demo-differs' });
    writeFileSync(path, bytes);
  });
});

test('a folder that cannot be made is one clear error', async () => {
  writeFileSync(join(top, 'file'), '');
  await expect(writeDemo(join(top, 'file', 'demo'), data)).rejects.toMatchObject({
    name: 'UserError',
    code: 'cannot-write',
  });
});
