import { UserError } from '../data/errors';
import { readExactly, sliceOf, truncated, uint64, utf8, viewOf } from './bytes';
import type { ByteSource } from './format';
import { Inflated, MOST_GROWTH } from './inflated';

/** One file of an archive. */
export interface ZipMember {
  readonly name: string;
  readonly method: number;
  readonly crc: number;
  readonly packedSize: number;
  readonly size: number;
  readonly headerOffset: number;
}

const END = 0x06054b50;
const END64 = 0x06064b50;
const LOCATOR64 = 0x07064b50;
const ENTRY = 0x02014b50;
const LOCAL = 0x04034b50;
const MOST_MEMBERS = 100_000;

/** Directory of a ZIP archive, ZIP64 included (PKWARE APPNOTE 6.3, sections 4.3 and 4.5). */
export function zipMembers(source: ByteSource): ZipMember[] {
  const { offset, size, count } = directoryPlace(source);
  if (offset + size > source.size)
    throw truncated(source.name, offset + size, source.size, 'the directory of the archive');
  if (count > MOST_MEMBERS) throw damaged(source.name, `a directory of ${count} members`);
  const bytes = readExactly(source, offset, size, 'the directory of the archive');
  const view = viewOf(bytes);
  const out: ZipMember[] = [];
  let at = 0;
  while (out.length < count) {
    if (at + 46 > bytes.length || view.getUint32(at, true) !== ENTRY)
      throw damaged(source.name, `entry ${out.length + 1} of its directory is not one`);
    const nameLength = view.getUint16(at + 28, true);
    const extraLength = view.getUint16(at + 30, true);
    const name = utf8(bytes.subarray(at + 46, at + 46 + nameLength));
    if (view.getUint16(at + 8, true) & 1)
      throw new UserError(
        'archive-encrypted',
        `${source.name}: ${name} is encrypted. Unpack it first.`,
        source.name,
      );
    const wide = wideSizes(bytes, at, nameLength, extraLength);
    out.push({ name, method: view.getUint16(at + 10, true), crc: view.getUint32(at + 16, true), ...wide });
    at += 46 + nameLength + extraLength + view.getUint16(at + 32, true);
  }
  return out;
}

/** Sizes and offset of an entry; those that are FFFFFFFF are in the ZIP64 extra field (id 1), in this order. */
function wideSizes(
  bytes: Uint8Array,
  at: number,
  nameLength: number,
  extraLength: number,
): { size: number; packedSize: number; headerOffset: number } {
  const view = viewOf(bytes);
  const extraFrom = at + 46 + nameLength;
  let next = -1;
  for (
    let e = extraFrom;
    e + 4 <= Math.min(bytes.length, extraFrom + extraLength);
    e += 4 + view.getUint16(e + 2, true)
  )
    if (view.getUint16(e, true) === 1) next = e + 4;
  const field = (where: number): number => {
    const value = view.getUint32(where, true);
    if (value !== 0xffffffff || next < 0 || next + 8 > bytes.length) return value;
    next += 8;
    return uint64(view, next - 8);
  };
  const size = field(at + 24);
  const packedSize = field(at + 20);
  return { size, packedSize, headerOffset: field(at + 42) };
}

function directoryPlace(source: ByteSource): { offset: number; size: number; count: number } {
  const from = Math.max(0, source.size - 65_557);
  const tail = source.read(from, source.size - from);
  const view = viewOf(tail);
  let at = tail.length - 22;
  while (at >= 0 && view.getUint32(at, true) !== END) at--;
  if (at < 0)
    throw new UserError(
      'file-truncated',
      `${source.name} is cut short: the directory that ends a ZIP archive is missing. Copy the file again.`,
      source.name,
    );
  const place = {
    count: view.getUint16(at + 10, true),
    size: view.getUint32(at + 12, true),
    offset: view.getUint32(at + 16, true),
  };
  if (at < 20 || view.getUint32(at - 20, true) !== LOCATOR64) return place;
  const end64 = viewOf(readExactly(source, uint64(view, at - 12), 56, 'the ZIP64 directory end'));
  if (end64.getUint32(0, true) !== END64) throw damaged(source.name, 'its ZIP64 directory end is not one');
  return { count: uint64(end64, 32), size: uint64(end64, 40), offset: uint64(end64, 48) };
}

/** Bytes of a member, read by offset; compressed ones are inflated as they are read. */
export function memberBytes(source: ByteSource, m: ZipMember): ByteSource {
  const name = `${source.name}: ${m.name}`;
  const local = readExactly(source, m.headerOffset, 30, `the header of ${m.name}`);
  const view = viewOf(local);
  if (view.getUint32(0, true) !== LOCAL)
    throw damaged(source.name, `${m.name} does not begin where the directory says`);
  const offset = m.headerOffset + 30 + view.getUint16(26, true) + view.getUint16(28, true);
  if (offset + m.packedSize > source.size)
    throw truncated(source.name, offset + m.packedSize, source.size, m.name);
  if (m.method === 0) {
    if (m.size !== m.packedSize) throw damaged(source.name, `${m.name} is stored but has two sizes`);
    return sliceOf(source, name, offset, m.size);
  }
  if (m.method !== 8)
    throw new UserError(
      'archive-method',
      `${name} is compressed by method ${m.method}; only stored and deflated members can be read. Write it with numpy.savez_compressed.`,
      name,
    );
  if (m.size > m.packedSize * MOST_GROWTH + 64)
    throw damaged(
      source.name,
      `${m.name} promises ${m.size} bytes from ${m.packedSize}, more than deflate can make`,
    );
  return new Inflated(
    source,
    name,
    { kind: 'deflate', offset, end: offset + m.packedSize, crc: m.crc },
    m.size,
  );
}

function damaged(name: string, why: string): UserError {
  return new UserError('file-damaged', `${name} is a damaged archive: ${why}. Copy the file again.`, name);
}
