import { UserError } from '../data/errors';
import { readExactly, viewOf } from './bytes';
import type { ByteSource } from './format';

const EXTRA = 4;
const NAME = 8;
const COMMENT = 16;
const HEADER_CRC = 2;

/** Offset of the compressed data of the gzip member that begins at `at` (RFC 1952, section 2.3). */
export function gzipHeaderEnd(source: ByteSource, at: number): number {
  const head = readExactly(source, at, 10, 'the gzip header');
  if (head[0] !== 0x1f || head[1] !== 0x8b || head[2] !== 8)
    throw new UserError(
      'file-damaged',
      `${source.name} has no gzip header at byte ${at}. Copy the file again.`,
      source.name,
    );
  const flags = head[3];
  let next = at + 10;
  if (flags & EXTRA) next += 2 + viewOf(readExactly(source, next, 2, 'the gzip header')).getUint16(0, true);
  if (flags & NAME) next = afterZero(source, next);
  if (flags & COMMENT) next = afterZero(source, next);
  return flags & HEADER_CRC ? next + 2 : next;
}

function afterZero(source: ByteSource, at: number): number {
  const bytes = source.read(at, 4096);
  const zero = bytes.indexOf(0);
  if (zero < 0)
    throw new UserError(
      'file-damaged',
      `${source.name} has a gzip header without end. Copy the file again.`,
      source.name,
    );
  return at + zero + 1;
}
