// Compiles src/wasm to dist/kernels.wasm when a source is newer than it.
import { readdirSync, renameSync, mkdirSync, statSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import asc from 'assemblyscript/asc';

const root = fileURLToPath(new URL('..', import.meta.url));
const out = `${root}dist/kernels.wasm`;
const mtime = (file) => statSync(file, { throwIfNoEntry: false })?.mtimeMs ?? 0;

/** Builds dist/kernels.wasm if it is missing or out of date; returns its path. Throws with the compiler's messages. */
export async function buildWasm() {
  const sources = readdirSync(`${root}src/wasm`).filter((f) => f.endsWith('.ts'));
  const newest = Math.max(
    mtime(fileURLToPath(import.meta.url)),
    ...sources.map((f) => mtime(`${root}src/wasm/${f}`)),
  );
  if (mtime(out) > newest) return out;
  mkdirSync(`${root}dist`, { recursive: true });
  // Written under another name first: several test processes may build at the same time.
  const part = `dist/kernels.${process.pid}.wasm`;
  const options = ['--runtime', 'stub', '--enable', 'simd', '--importMemory', '--noAssert', '-O3'];
  const { error, stderr } = await asc.main([
    'src/wasm/index.ts',
    '--outFile',
    part,
    '--baseDir',
    root,
    ...options,
  ]);
  if (error) throw new Error(`the kernels do not compile: ${error.message}\n${stderr.toString()}`);
  renameSync(`${root}${part}`, out);
  return out;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) console.log(await buildWasm());
