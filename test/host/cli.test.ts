import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { EngineApi } from '../../src/core/protocol/engine';
import { Engine } from '../../src/core/recipe/engine';
import { runCli } from '../../src/host/cli/cli';
import type { World } from '../../src/host/cli/world';
import { nodeHost } from '../../src/host/node-host';
import { npyBytes } from '../cases/data';
import { gaussianNoise } from '../steps/synthetic';

let folder = '';
let engine: Promise<EngineApi>;
const recipe = (expected: object): string =>
  JSON.stringify({
    fringe: 1,
    inputs: { data: { file: 'noise.npy', rate: 512, unit: 'V' } },
    steps: [
      { id: 'look', do: 'overview', of: ['data'] },
      { id: 'noise', do: 'noise-spectrum', of: ['data'], segment: 1 },
    ],
    expect: expected,
  });

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'fringeside-cli-'));
  writeFileSync(
    join(folder, 'noise.npy'),
    npyBytes(gaussianNoise(512 * 32, 1, 4) as Float64Array<ArrayBuffer>),
  );
  writeFileSync(join(folder, 'good.fringe.json'), recipe({ 'look.samples': { value: 16384, abs: 0 } }));
  writeFileSync(
    join(folder, 'wrong.fringe.json'),
    recipe({ 'look.samples': { value: 16385, abs: 0 }, 'look.rms': { value: 1, rel: 0.1 } }),
  );
  writeFileSync(join(folder, 'typo.fringe.json'), recipe({}).replace('"segment"', '"segmnt"'));
  writeFileSync(join(folder, 'broken.fringe.json'), '{ "fringe": 1,');
  engine = nodeHost(join(process.cwd(), 'dist')).then((host) => new Engine(host));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

async function cli(...argv: string[]): Promise<{ code: number; out: string; err: string }> {
  let out = '';
  let err = '';
  const world: World = {
    out: (t) => (out += t),
    err: (t) => (err += t),
    progress: false,
    columns: 100,
    cwd: folder,
    dist: join(process.cwd(), 'dist'),
    engine: () => engine,
    cancelled: () => false,
  };
  const code = await runCli(argv, world);
  return { code, out, err };
}

describe('help and wrong use', () => {
  test('help lists every command and the exit codes; nothing at all is a wrong use', async () => {
    const help = await cli('--help');
    expect(help.code).toBe(0);
    for (const name of ['overview', 'run', 'verify', 'export', 'steps', 'demo'])
      expect(help.out).toContain(`fringeside ${name}`);
    expect(help.out).toContain('Exit codes');
    expect((await cli()).code).toBe(2);
    expect((await cli('run', '--help')).out).toContain('--json');
  });

  test.each([
    [['verfy', 'x'], /unknown command "verfy".*"verify"/],
    [['run', '--jsn', 'x'], /unknown option --jsn.*"json"/],
    [['run'], /usage: fringeside run/],
    [['run', 'a', 'b'], /usage: fringeside run/],
    [['run', 'gone.fringe.json'], /gone\.fringe\.json: there is no such file/],
    [['run', '.'], /is a folder/],
    [['steps', 'noise-spectum'], /no step "noise-spectum".*"noise-spectrum"/],
    [['overview', 'gone.h5'], /gone\.h5/],
  ])('%j is one line on stderr and code 2', async (argv, message) => {
    const { code, out, err } = await cli(...argv);
    expect(code).toBe(2);
    expect(out).toBe('');
    expect(err.trimEnd()).toMatch(message);
    expect(err.trimEnd().split('\n')).toHaveLength(1);
  });
});

describe('run', () => {
  test('prints sentences, numbers with units, warnings, provenance and the caution', async () => {
    const { code, out, err } = await cli('run', 'good.fringe.json');
    expect([code, err]).toEqual([0, '']);
    expect(out).toContain('noise: Noise spectrum');
    expect(out).toMatch(/Resolution +1\.5 Hz/);
    expect(out).toContain('SHA-256');
    expect(out).toContain('not a detection statement');
  });

  test('--json is one JSON document with numbers and provenance', async () => {
    const { out } = await cli('run', 'good.fringe.json', '--json');
    const result = JSON.parse(out) as {
      steps: { id: string; numbers: { id: string; value: number }[] }[];
      inputs: { sha256: string }[];
    };
    expect(result.steps.map((s) => s.id)).toEqual(['look', 'noise']);
    expect(result.steps[0].numbers.find((n) => n.id === 'samples')?.value).toBe(16384);
    expect(result.inputs[0].sha256).toMatch(/^[0-9a-f]{64}$/);
  });

  test('--workers gives the same numbers, and says what it takes', async () => {
    interface Result {
      steps: { numbers: unknown }[];
    }
    const numbers = async (...more: string[]): Promise<unknown> =>
      (JSON.parse((await cli('run', 'good.fringe.json', '--json', ...more)).out) as Result).steps.map(
        (s) => s.numbers,
      );
    expect(await numbers('--workers', '2')).toEqual(await numbers());
    expect(await cli('run', 'good.fringe.json', '--workers', '0')).toMatchObject({
      code: 2,
      err: expect.stringContaining('--workers must be') as string,
    });
  });

  test('--out writes the result and a report that holds everything, and the same again the second time', async () => {
    await cli('run', 'good.fringe.json', '--out', 'results');
    const path = join(folder, 'results', 'report.html');
    const first = readFileSync(path, 'utf8');
    expect(existsSync(join(folder, 'results', 'result.json'))).toBe(true);
    expect(first).not.toMatch(/<(?:script|link|img)[^>]+(?:src|href)=/);
    expect(first).toContain('Noise spectrum');
    await cli('run', 'good.fringe.json', '--out', 'results');
    expect(readFileSync(path, 'utf8')).toBe(first);
  });

  test('problems of a recipe come with file, line and column; the rest still runs', async () => {
    const typo = await cli('run', 'typo.fringe.json');
    expect(typo.code).toBe(3);
    expect(typo.err).toMatch(/typo\.fringe\.json:1:\d+: error: .*"segmnt".*"segment"/);
    expect(typo.out).toContain('look: Overview');
    const broken = await cli('run', 'broken.fringe.json');
    expect(broken.code).toBe(2);
    expect(broken.err).toMatch(/broken\.fringe\.json:1:\d+: error: not valid JSON/);
  });
});

describe('verify', () => {
  test('agreement is code 0, a difference code 1 with both numbers', async () => {
    expect(await cli('verify', 'good.fringe.json')).toMatchObject({
      code: 0,
      out: expect.stringContaining('all 1 numbers agree') as string,
    });
    const wrong = await cli('verify', 'wrong.fringe.json');
    expect(wrong.code).toBe(1);
    expect(wrong.out).toMatch(/DIFFERS +look\.samples +16384 +expected 16385/);
    expect(wrong.out).toContain('1 of 2 numbers differ');
  });

  test('a recipe without expectations says there is nothing to compare', async () => {
    expect((await cli('verify', 'typo.fringe.json')).err).toContain('no "expect"');
  });
});

test('overview asks for a rate that a file does not say, and takes it from the command line', async () => {
  expect(await cli('overview', 'noise.npy')).toMatchObject({
    code: 3,
    out: expect.stringContaining('give "rate"') as string,
  });
  const given = await cli('overview', 'noise.npy', '--rate', '512');
  expect(given.code).toBe(0);
  expect(given.out).toMatch(/Sample rate +512 Hz/);
});

test('steps explains one with parameters, bounds and sources', async () => {
  const { out } = await cli('steps', 'noise-spectrum');
  expect(out).toMatch(/segment = 4 {2}\(s/);
  expect(out).toContain('Welch');
});

describe('the built program', () => {
  const main = join(process.cwd(), 'dist', 'cli.mjs');
  const spawn = (...argv: string[]) =>
    spawnSync(process.execPath, [main, ...argv], { cwd: folder, encoding: 'utf8' });

  test('results on stdout, nothing on stderr when it is not a terminal, exit codes as documented', () => {
    const good = spawn('verify', 'good.fringe.json');
    expect([good.status, good.stderr]).toEqual([0, '']);
    expect(spawn('verify', 'wrong.fringe.json').status).toBe(1);
    expect(spawn('run', 'gone.fringe.json').status).toBe(2);
    expect(spawn('run', 'typo.fringe.json').status).toBe(3);
  });
});

describe('export', () => {
  test('prints one script, or writes it and says from where the data are reached', async () => {
    const printed = await cli('export', 'good.fringe.json');
    expect([printed.code, printed.err]).toEqual([0, '']);
    expect(printed.out).toMatch(/^# \/\/\/ script\n/);
    expect(printed.out).toContain('out["noise"] = noise_spectrum(');
    const written = await cli('export', 'good.fringe.json', '--out', 'deeper/look.py', '--step', 'look');
    expect([written.code, written.out, written.err]).toEqual([0, '', 'wrote deeper/look.py\n']);
    const script = readFileSync(join(folder, 'deeper', 'look.py'), 'utf8');
    expect(script).toContain('.parent / ".."\n');
    expect(script).not.toContain('noise_spectrum');
  });

  test('names what is wrong, and never writes over data', async () => {
    const before = readFileSync(join(folder, 'noise.npy'));
    const over = await cli('export', 'good.fringe.json', '--out', 'noise.npy');
    expect([over.code, over.err]).toEqual([
      2,
      'fringeside: --out names the script, and "noise.npy" does not end in .py\n',
    ]);
    expect(readFileSync(join(folder, 'noise.npy')).equals(before)).toBe(true);
    const step = await cli('export', 'good.fringe.json', '--step', 'nois');
    expect(step.code).toBe(2);
    expect(step.err).toMatch(/no step "nois".*noise/);
    expect((await cli('export', 'broken.fringe.json')).code).toBe(2);
    writeFileSync(join(folder, 'partly.fringe.json'), recipe({}).replace('"segment":1', '"segment":100'));
    const partly = await cli('export', 'partly.fringe.json');
    expect(partly.code).toBe(3);
    expect(partly.err).toMatch(/^left out: step "noise" \(noise-spectrum\): no segment of 100 s fits/);
    expect(partly.out).toContain('# Left out: step "noise" (noise-spectrum)');
  });
});
