import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';

const here = new URL('.', import.meta.url).pathname;

/** Numbers of `test/oracle/<topic>.json`, written by `<topic>.py` beside it with NumPy and SciPy. */
// eslint-disable-next-line @typescript-eslint/no-unnecessary-type-parameters -- the caller knows what its generator writes
export function oracle<T>(topic: string): T {
  return JSON.parse(readFileSync(`${here}${topic}.json`, 'utf8')) as T;
}

/** The interpreter that has SciPy, or the reason why the live comparison cannot run. */
export function scipyPython(): { python: string } | { absent: string } {
  const python = process.env['FRINGESIDE_PYTHON'] ?? 'python3';
  const probe = spawnSync(python, ['-c', 'import scipy, numpy; print(scipy.__version__)'], {
    encoding: 'utf8',
  });
  return probe.status === 0 ? { python } : { absent: `${python} has no SciPy` };
}

/** Runs `<topic>.py` now and returns what it prints, parsed. */
export function regenerate(python: string, topic: string): unknown {
  const run = spawnSync(python, [`${here}${topic}.py`], { encoding: 'utf8', maxBuffer: 1 << 30 });
  if (run.status !== 0) throw new Error(`${topic}.py failed: ${run.stderr}`);
  return JSON.parse(run.stdout);
}
