import {
  copyFileSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { stepSources, shared, readers, frame } from '../../src/core/python';
import { Engine } from '../../src/core/recipe/engine';
import { nodeHost } from '../../src/host/node-host';
import { makeSamples, npyBytes, type Case } from '../cases/data';
import { python, runPython, runScripts, type Ran } from './python';

const cases = new URL('../cases/', import.meta.url).pathname;
const names = readdirSync(cases, { withFileTypes: true }).flatMap((e) => (e.isDirectory() ? [e.name] : []));
const found = python();
const absent = 'absent' in found ? found.absent : undefined;
const interpreter = 'python' in found ? found.python : '';

let work = '';
let engine: Engine;
beforeAll(async () => {
  work = mkdtempSync(join(tmpdir(), 'fringeside-python-'));
  engine = new Engine(await nodeHost(join(process.cwd(), 'dist')));
});
afterAll(() => rmSync(work, { recursive: true, force: true }));

const quiet = { event: () => undefined, cancelled: () => false };

/** A folder with the recipe, data and script of a case. */
async function exported(name: string, only?: readonly string[]) {
  const folder = join(work, only ? `${name}-${only.join('-')}` : name);
  mkdirSync(folder, { recursive: true });
  for (const file of readdirSync(join(cases, name)))
    if (file !== 'case.json') copyFileSync(join(cases, name, file), join(folder, file));
  const { data } = JSON.parse(readFileSync(join(cases, name, 'case.json'), 'utf8')) as Case;
  writeFileSync(join(folder, 'data.npy'), npyBytes(makeSamples(data)));
  const text = readFileSync(join(folder, 'recipe.fringe.json'), 'utf8');
  const made = await engine.exportPython({ text, folder, dataFolder: '.', ...(only ? { only } : {}) }, quiet);
  if (made.script !== undefined) writeFileSync(join(folder, 'look.py'), made.script);
  return { folder, text, ...made };
}

interface Outcome {
  readonly agrees: boolean;
  readonly numbers: readonly { step: string; quantity: string; agrees: boolean }[];
}
const outcome = (ran: Ran): Outcome => JSON.parse(ran.out) as Outcome;

describe('every case agrees with its own export', () => {
  if (absent !== undefined) test.skip(`not run: ${absent}`, () => undefined);
  else {
    const ran = new Map<string, { leftOut: unknown; ran: Ran }>();
    beforeAll(async () => {
      const made = [];
      for (const name of names) made.push(await exported(name));
      const scripts = made.filter((m) => m.script !== undefined).map((m) => join(m.folder, 'look.py'));
      const all = runScripts(interpreter, scripts);
      for (const [k, name] of names.entries()) {
        const at = scripts.indexOf(join(made[k].folder, 'look.py'));
        ran.set(name, {
          leftOut: made[k].leftOut,
          ran: all[at] ?? { code: null, out: '', err: 'no script' },
        });
      }
    }, 240_000);

    test.each(names)('%s', (name) => {
      const found = ran.get(name)!;
      expect(found.leftOut).toEqual([]);
      expect([found.ran.code, found.ran.err]).toEqual([0, '']);
      const { agrees, numbers } = outcome(found.ran);
      expect(agrees).toBe(true);
      expect(numbers.length).toBeGreaterThan(0);
    });
  }
});

describe('disagreement is seen', () => {
  if (absent !== undefined) test.skip(`not run: ${absent}`, () => undefined);
  else {
    test('a number that is not Fringeside’s', async () => {
      const { folder, script } = await exported('few-averages');
      const wrong = script!.replace('"segments": (3.0,', '"segments": (4.0,');
      expect(wrong).not.toBe(script);
      writeFileSync(join(folder, 'wrong.py'), wrong);
      const ran = runPython(interpreter, ['wrong.py'], folder);
      expect(ran.code).toBe(1);
      expect(ran.err).toContain('DIFFERS noise.segments: 3.0, expected 4.0');
      expect(outcome(ran).agrees).toBe(false);
    });

    test('a parameter that is not the recipe’s', async () => {
      const { folder, script } = await exported('few-averages');
      writeFileSync(join(folder, 'other.py'), script!.replace('"segment_s": 2.0', '"segment_s": 1.0'));
      expect(runPython(interpreter, ['other.py'], folder).code).toBe(1);
    });

    test('one bit of the data', async () => {
      const { folder } = await exported('few-averages');
      const bytes = readFileSync(join(folder, 'data.npy'));
      bytes[4000] ^= 1;
      writeFileSync(join(folder, 'data.npy'), bytes);
      const ran = runPython(interpreter, ['look.py'], folder);
      expect(ran.code).toBe(1);
      expect(ran.err).toContain('are not those Fringeside read');
    });

    test('a file that is not there', async () => {
      const { folder } = await exported('few-averages');
      rmSync(join(folder, 'data.npy'));
      const ran = runPython(interpreter, ['look.py'], folder);
      expect(ran.code).toBe(1);
      expect(ran.err).toMatch(/^data: there is no file .*data\.npy/);
    });
  }
});

describe('the script', () => {
  test('has its parts in order, the same each time, and nothing that changes', async () => {
    const { script } = await exported('white-noise');
    const again = await exported('white-noise');
    expect(again.script).toBe(script);
    const cells = [...script!.matchAll(/^# %% (.*)$/gm)].map((m) => m[1]);
    expect(cells).toEqual([
      'Imports',
      'Where the data are: the first argument, or the folder of the recipe',
      'Inputs as Fringeside found them',
      'Parameters of the steps, units in their names. Other values give other numbers than those at the end.',
      'Reading',
      ...cells.filter((c) => c === 'Used by several steps'),
      'Step noise-spectrum',
      'All steps in order',
      'Numbers that Fringeside found: value, unit, relative and absolute tolerance',
      'Agreement',
    ]);
    expect(script).toMatch(
      /^# \/\/\/ script\n# requires-python = ".*"\n# dependencies = \["numpy>=[\d.]+", "scipy>=[\d.]+"\]\n# \/\/\/\n/,
    );
    expect(script).not.toContain('h5py');
    expect(script).toContain(
      stepSources['noise-spectrum'].slice(stepSources['noise-spectrum'].indexOf('def ')).trim(),
    );
    expect(script).toContain('"segment_s": 1.0,');
    expect(script).not.toContain(work);
  });

  test('of one step has that step and what it needs only', async () => {
    const { steps } = await exported('one-gap', ['noise']);
    expect(steps).toEqual(['noise']);
  });

  test('cannot be broken by names', async () => {
    const folder = join(work, 'hostile');
    mkdirSync(folder);
    const hostile = `a"""b'''\\"); import os\n# %% x\u202e\u2028é😀`;
    const file = `d'"é.f64`;
    const { data } = JSON.parse(readFileSync(join(cases, 'few-averages', 'case.json'), 'utf8')) as Case;
    writeFileSync(join(folder, file), Buffer.from(makeSamples(data).buffer));
    writeFileSync(
      join(folder, `${file}.json`),
      JSON.stringify({ type: 'float64', rate: 512, channels: [hostile, 'other'], unit: hostile }),
    );
    const text = JSON.stringify({
      fringe: 1,
      title: `${hostile}\n# /// script\r# ///`,
      inputs: { data: { file, channel: hostile, unit: hostile } },
      steps: [{ id: 'look', do: 'overview', of: ['data'] }],
    });
    const { script, diagnostics } = await engine.exportPython({ text, folder, dataFolder: '.' }, quiet);
    expect(diagnostics).toEqual([]);
    expect(script!.match(/^# \/\/\/ script$/gm)).toHaveLength(1);
    expect(script).not.toMatch(/[\u202e\u2028]/);
    if (absent !== undefined) return;
    writeFileSync(join(folder, 'look.py'), script!);
    const ran = runPython(interpreter, ['look.py'], folder);
    expect([ran.code, ran.err]).toEqual([0, '']);
  });
});

describe('Python files', () => {
  if (absent !== undefined) test.skip(`not compiled: ${absent}`, () => undefined);
  else
    test('all are Python', () => {
      const folder = join(work, 'syntax');
      mkdirSync(folder);
      const files = [stepSources, shared, readers, frame].flatMap((group, g) =>
        Object.entries(group).map(([name, text]) => {
          const path = join(folder, `${g}-${name}.py`);
          writeFileSync(path, text);
          return path;
        }),
      );
      const ran = runPython(interpreter, ['-W', 'error', '-m', 'py_compile', ...files]);
      expect([ran.code, ran.err]).toEqual([0, '']);
    });
});
