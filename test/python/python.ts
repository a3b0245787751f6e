import { spawnSync } from 'node:child_process';
import { scipyPython } from '../oracle/oracle';

/** The interpreter for exported scripts, or why there is none. Where `CI` is set there must be one. */
export function python(): { python: string } | { absent: string } {
  const found = scipyPython();
  if ('absent' in found && process.env['CI'] !== undefined) throw new Error(`CI is set, but ${found.absent}`);
  return found;
}

export interface Ran {
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
}

export function runPython(interpreter: string, args: readonly string[], cwd?: string): Ran {
  const run = spawnSync(interpreter, args, {
    encoding: 'utf8',
    maxBuffer: 1 << 28,
    ...(cwd === undefined ? {} : { cwd }),
  });
  return { code: run.status, out: run.stdout, err: run.stderr };
}
