import { UserError } from '../data/errors';
import type { ByteSource } from './format';

const BLOCK = 1 << 20;
const LONGEST_LINE = 1 << 24;

/** A line in a block: `bytes[from, to)`, its offset in the file; return false to stop. */
export type LineHandler = (bytes: Uint8Array, from: number, to: number, offset: number) => boolean;

/**
 * Calls `handle` for every line from `offset` on, in blocks, until it returns false or the text ends; the line end is
 * not part of the line. `begin` is called with each new block before its lines.
 */
export function eachLine(
  source: ByteSource,
  offset: number,
  newline: number,
  handle: LineHandler,
  begin?: (bytes: Uint8Array) => void,
): void {
  for (let at = offset, size = BLOCK; ;) {
    const bytes = source.read(at, size);
    if (bytes.length === 0) return;
    const last = bytes.length < size;
    const end = last ? bytes.length : bytes.lastIndexOf(newline) + 1;
    if (end === 0) {
      if (size >= LONGEST_LINE)
        throw new UserError(
          'line-too-long',
          `${source.name} has a line longer than ${LONGEST_LINE} bytes at byte ${at}. Is it a text file?`,
          source.name,
        );
      size *= 4;
      continue;
    }
    begin?.(bytes);
    for (let from = 0; from < end;) {
      const found = bytes.indexOf(newline, from);
      const to = found < 0 || found > end ? end : found;
      if (!handle(bytes, from, to, at + from)) return;
      from = to + 1;
    }
    if (last) return;
    at += end;
    size = BLOCK;
  }
}
