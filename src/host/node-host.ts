import { createHash } from 'node:crypto';
import { existsSync, readFileSync, statSync } from 'node:fs';
import { dirname, isAbsolute, join, resolve } from 'node:path';
import { performance } from 'node:perf_hooks';
import { fileURLToPath } from 'node:url';
import { UserError } from '../core/data/errors';
import { createKernels } from '../core/kernels/kernels';
import { compileKernels } from '../core/kernels/wasm-module';
import type { EngineHost } from '../core/recipe/engine-host';
import { initReaders, openDataFile } from './open-file';
import { VERSION } from './version';

const MiB = 1 << 20;
const MAX_TEXT = 64 * MiB;

/** Folder of the built program: where kernels.wasm lies beside the bundle that runs. */
export const distFolder = (): string => dirname(fileURLToPath(import.meta.url));

/** The engine's host on Node: file system, SHA-256, clock, kernels from `dist/kernels.wasm`. */
export async function nodeHost(dist = distFolder()): Promise<EngineHost> {
  await initReaders();
  const wasm = join(dist, 'kernels.wasm');
  const module = existsSync(wasm) ? compileKernels(readFileSync(wasm)) : undefined;
  return {
    version: VERSION,
    kernels: createKernels(module),
    memoryLimit: 176 * MiB,
    cacheLimit: 256 * MiB,
    open: openDataFile,
    stamp: (path) => {
      const s = stat(path);
      return `${String(s.size)}-${String(s.mtimeMs)}-${path}`;
    },
    resolve: (folder, path) => (isAbsolute(path) ? path : resolve(folder, path)),
    readText: (path) => {
      if (stat(path).size > MAX_TEXT)
        throw new UserError(
          'too-large',
          `${path} is larger than ${MAX_TEXT / MiB} MiB, too large for a text file of this kind`,
          path,
        );
      return readFileSync(path, 'utf8');
    },
    hasher: () => {
      const hash = createHash('sha256');
      return { update: (bytes) => void hash.update(bytes), digest: () => hash.digest('hex') };
    },
    breathe: () => new Promise((done) => setImmediate(done)),
    now: () => performance.now(),
  };
}

function stat(path: string): { size: number; mtimeMs: number } {
  try {
    return statSync(path);
  } catch {
    throw new UserError('no-file', `${path} cannot be read: there is no such file, or no permission`, path);
  }
}
