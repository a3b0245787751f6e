import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { Engine } from '../../src/core/recipe/engine';
import { writeDemo } from '../../src/host/demo-files';
import { nodeHost } from '../../src/host/node-host';
import { runPython } from './python';

/** The first interpreter with h5py; where `CI` is set there must be one. */
function withH5py(): string | undefined {
  const candidates = [process.env['FRINGESIDE_PYTHON'] ?? 'python3', '/usr/bin/python3'];
  const python = candidates.find((p) => spawnSync(p, ['-c', 'import h5py, scipy']).status === 0);
  if (python === undefined && process.env['CI'] !== undefined)
    throw new Error(`CI is set, but none of ${candidates.join(', ')} has h5py and SciPy`);
  return python;
}

const python = withH5py();
let work = '';
let engine: Engine;
beforeAll(async () => {
  work = mkdtempSync(join(tmpdir(), 'fringeside-python-'));
  engine = new Engine(await nodeHost(join(process.cwd(), 'dist')));
});
afterAll(() => rmSync(work, { recursive: true, force: true }));

const quiet = { event: () => undefined, cancelled: () => false };

if (python === undefined) test.skip('HDF5 not read in Python: no interpreter here has h5py', () => undefined);
else {
  test('the demo agrees with its export', async () => {
    await writeDemo(work);
    const text = readFileSync(join(work, 'demo.fringe.json'), 'utf8');
    const made = await engine.exportPython({ text, folder: work, dataFolder: '.' }, quiet);
    // What is still without an equivalent (see the registry test), and what needs it.
    const without: string[] = [];
    expect(made.leftOut.filter((s) => !without.includes(s.do))).toEqual([]);
    expect(made.script).toContain('dependencies = ["numpy>=1.24", "scipy>=1.10", "h5py"]');
    writeFileSync(join(work, 'look.py'), made.script!);
    const ran = runPython(python, ['look.py'], work);
    expect([ran.code, ran.err]).toEqual([0, '']);
  });

  test('the folder of the data may be another one, given as argument', async () => {
    const folder = new URL('../fixtures/formats', import.meta.url).pathname;
    const text = JSON.stringify({
      fringe: 1,
      inputs: { gap: { file: 'time-gap.h5', channel: '/strain' } },
      steps: [{ id: 'look', do: 'overview', of: ['gap'] }],
    });
    const made = await engine.exportPython({ text, folder, dataFolder: 'nowhere' }, quiet);
    expect([made.diagnostics, made.leftOut]).toEqual([[], []]);
    expect(made.script).toMatch(/"runs": \[\(0, \d+\), \(\d+, \d+\)/);
    const script = join(work, 'gap.py');
    writeFileSync(script, made.script!);
    expect(runPython(python, [script], work).code).toBe(1);
    const ran = runPython(python, [script, folder], work);
    expect([ran.code, ran.err]).toEqual([0, '']);
  });
}
