import { strFromU8 } from 'fflate';
import { UserError } from '../data/errors';
import type { ByteSource } from './format';

/** Bytes `[offset, offset + length)`; a UserError when the file ends earlier. `what` names the part for the message. */
export function readExactly(source: ByteSource, offset: number, length: number, what: string): Uint8Array {
  const bytes = source.read(offset, length);
  if (bytes.length < length) throw truncated(source.name, offset + length, offset + bytes.length, what);
  return bytes;
}

export function truncated(name: string, needed: number, got: number, what: string): UserError {
  return new UserError(
    'file-truncated',
    `${name} is cut short: ${what} should reach byte ${needed} but the file ends at byte ${got}. Copy the file again.`,
    name,
  );
}

export function viewOf(bytes: Uint8Array): DataView {
  return new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
}

/** Text of bytes, one character per byte: exact for ASCII, and every offset stays a byte offset. */
export function latin1(bytes: Uint8Array): string {
  return strFromU8(bytes, true);
}

export function utf8(bytes: Uint8Array): string {
  return strFromU8(bytes);
}

export function startsWith(bytes: Uint8Array, magic: string): boolean {
  if (bytes.length < magic.length) return false;
  for (let i = 0; i < magic.length; i++) if (bytes[i] !== magic.charCodeAt(i)) return false;
  return true;
}

/** Unsigned 64-bit little-endian integer as a number; offsets beyond 2^53 cannot occur in a real file. */
export function uint64(view: DataView, offset: number): number {
  return view.getUint32(offset + 4, true) * 2 ** 32 + view.getUint32(offset, true);
}

/** Part of a source seen as a source of its own; closing it leaves the whole open. */
export function sliceOf(source: ByteSource, name: string, offset: number, size: number): ByteSource {
  return {
    name,
    size,
    read: (at, length) => source.read(offset + at, Math.max(0, Math.min(length, size - at))),
    close: () => undefined,
  };
}
