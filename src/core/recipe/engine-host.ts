import type { OpenFile } from '../formats/format';
import type { Kernels } from '../kernels/kernels';
import type { Hasher } from './fingerprint';

/** What the engine needs from the machine it runs on. */
export interface EngineHost {
  /** Version of this program, for provenance. */
  readonly version: string;
  readonly kernels: Kernels;
  /** Bytes a step may use for work arrays, and bytes of results kept for redrawing. */
  readonly memoryLimit: number;
  readonly cacheLimit: number;
  open(path: string): OpenFile;
  /** Changes whenever the file's content may have changed (size and modification time). */
  stamp(path: string): string;
  /** Absolute path of one written in a recipe of `folder`. */
  resolve(folder: string, path: string): string;
  readText(path: string): string;
  hasher(): Hasher;
  /** Resolves after other messages that wait have been handled. */
  breathe(): Promise<void>;
  /** Milliseconds of a steady clock. */
  now(): number;
}
