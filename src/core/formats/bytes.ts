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

/** Part of the encoding standard that every runtime has and the language's own types lack. */
interface Decoder {
  decode(bytes: Uint8Array): string;
}
const { TextDecoder: Decoders } = globalThis as unknown as { TextDecoder: new (label: string) => Decoder };
const SINGLE = new Decoders('windows-1252');
const UTF8 = new Decoders('utf-8');

/** Text of bytes, one character per byte, so that every index stays an offset; exact for ASCII. */
export function latin1(bytes: Uint8Array): string {
  return SINGLE.decode(bytes);
}

export function utf8(bytes: Uint8Array): string {
  return UTF8.decode(bytes);
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
