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

/** Runs each script as if it were started alone, but all in one process: loading SciPy takes longer than the scripts. */
const MANY = `
import contextlib, io, json, runpy, sys, traceback
results = []
for path in sys.argv[1:]:
    out, err, code = io.StringIO(), io.StringIO(), 0
    sys.argv = [path]
    with contextlib.redirect_stdout(out), contextlib.redirect_stderr(err):
        try:
            runpy.run_path(path, run_name="__main__")
        except SystemExit as e:
            code = e.code if isinstance(e.code, int) else 0 if e.code is None else 1
            if isinstance(e.code, str):
                print(e.code, file=err)
        except Exception:
            code = 1
            traceback.print_exc(file=err)
    results.append({"code": code, "out": out.getvalue(), "err": err.getvalue()})
print(json.dumps(results))
`;

export function runScripts(interpreter: string, paths: readonly string[]): readonly Ran[] {
  const ran = runPython(interpreter, ['-W', 'error', '-c', MANY, ...paths]);
  if (ran.code !== 0) throw new Error(ran.err);
  return JSON.parse(ran.out) as Ran[];
}
