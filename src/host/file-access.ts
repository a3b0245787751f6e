import {
  closeSync,
  existsSync,
  fstatSync,
  openSync,
  readSync,
  realpathSync,
  statSync,
  type Stats,
} from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { UserError } from '../core/data/errors';
import type { ByteSource, FileAccess } from '../core/formats/format';
import { openHdf5 } from './hdf5';

/**
 * A data file on this machine, opened for reading only. Throws a UserError for a path that does not exist, is a folder,
 * is empty or may not be read.
 */
export function fileAccess(path: string): FileAccess & { head(length: number): Uint8Array } {
  const name = basename(path);
  const stat = statOf(path, name);
  const bytes = (): ByteSource => openBytes(path, name, stat);
  return {
    path,
    name,
    size: stat.size,
    bytes,
    sibling(other) {
      const beside = join(dirname(path), other);
      if (!existsSync(beside)) return undefined;
      return openBytes(beside, other, statOf(beside, other));
    },
    hdf5: () => openHdf5(realpathSync(path), name, () => checkUnchanged(name, stat, statSync(path))),
    head(length) {
      const source = bytes();
      try {
        return source.read(0, length);
      } finally {
        source.close();
      }
    },
  };
}

function statOf(path: string, name: string): Stats {
  let stat: Stats;
  try {
    stat = statSync(path);
  } catch (e) {
    throw readFailure(e, path);
  }
  if (stat.isDirectory())
    throw new UserError('file-is-folder', `${path} is a folder. Open a data file in it.`, path);
  if (!stat.isFile()) throw new UserError('file-not-regular', `${path} is not a regular file.`, path);
  if (stat.size === 0)
    throw new UserError('file-empty', `${name} is empty (0 bytes). Copy or write the file again.`, path);
  return stat;
}

function openBytes(path: string, name: string, stat: Stats): ByteSource {
  let fd: number;
  try {
    fd = openSync(path, 'r');
  } catch (e) {
    throw readFailure(e, path);
  }
  let open = true;
  return {
    name,
    size: stat.size,
    read(offset, length) {
      if (!open) throw new Error(`${name} was closed and is read again`);
      checkUnchanged(name, stat, fstatSync(fd));
      const wanted = Math.max(0, Math.min(length, stat.size - offset));
      const bytes = new Uint8Array(wanted);
      let got = 0;
      while (got < wanted) {
        const n = readSync(fd, bytes, got, wanted - got, offset + got);
        if (n === 0) break;
        got += n;
      }
      return got === wanted ? bytes : bytes.subarray(0, got);
    },
    close() {
      if (open) closeSync(fd);
      open = false;
    },
  };
}

/** A reader must not mix two states of a file: what was read before would not belong to what comes now. */
function checkUnchanged(name: string, before: Stats, now: Stats): void {
  if (now.size === before.size && now.mtimeMs === before.mtimeMs) return;
  const what = now.size === before.size ? 'was written to' : `went from ${before.size} to ${now.size} bytes`;
  throw new UserError(
    'file-changed',
    `${name} ${what} while it was open. Open it again to see what it holds now.`,
    name,
  );
}

function readFailure(e: unknown, path: string): UserError {
  const code = (e as NodeJS.ErrnoException).code;
  if (code === 'ENOENT' || code === 'ENOTDIR')
    return new UserError('file-not-found', `There is no file ${path}. Check the path.`, path);
  if (code === 'EACCES' || code === 'EPERM')
    return new UserError(
      'file-not-readable',
      `${path} may not be read by this user. Change its permissions.`,
      path,
    );
  return new UserError('file-not-readable', `${path} cannot be read (${code ?? String(e)}).`, path);
}
