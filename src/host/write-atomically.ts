import {
  closeSync,
  existsSync,
  fsyncSync,
  mkdirSync,
  openSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { UserError } from '../core/data/errors';

/** Writes a file so that at every moment the old content or the whole new one is there. Makes the folder. */
export function writeAtomically(path: string, content: string | Uint8Array): void {
  const temporary = join(dirname(path), `.${basename(path)}.${String(process.pid)}.part`);
  try {
    mkdirSync(dirname(path), { recursive: true });
    const fd = openSync(temporary, 'w');
    try {
      writeFileSync(fd, content);
      fsyncSync(fd);
    } finally {
      closeSync(fd);
    }
    renameSync(temporary, path);
  } catch (e) {
    if (existsSync(temporary)) rmSync(temporary);
    const reason = e instanceof Error ? e.message : String(e);
    throw new UserError(
      'cannot-write',
      `${path} cannot be written: ${reason}. Nothing was changed there.`,
      path,
    );
  }
}
