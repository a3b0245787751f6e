import { readExactly, utf8, viewOf } from './bytes';
import type { ByteSource } from './format';
import type { NpyHeader } from './npy-header';
import { decodeSamples } from './samples';

/** Elements of an array that is shown as text or read as a fact. */
const SMALL = 64;

/** Value of a scalar or of a one-element array of numbers or text; undefined for everything else. */
export function smallArray(source: ByteSource, h: NpyHeader): string | number | bigint | undefined {
  const count = h.shape.reduce((a, b) => a * b, 1);
  if (count !== 1) return undefined;
  if (h.type !== undefined) {
    const bytes = readExactly(source, h.dataOffset, h.itemSize, 'a scalar');
    if (h.type === 'int64') return viewOf(bytes).getBigInt64(0, h.littleEndian);
    if (h.type === 'uint64') return viewOf(bytes).getBigUint64(0, h.littleEndian);
    const one = new Float64Array(1);
    decodeSamples(bytes, 1, { type: h.type, littleEndian: h.littleEndian, stride: h.itemSize }, one, 0);
    return one[0];
  }
  const m = /^([<>|=]?)([US])(\d{1,4})$/.exec(h.descr);
  if (!m || Number(m[3]) > SMALL * 4) return undefined;
  const length = Number(m[3]);
  if (m[2] === 'S') return utf8(readExactly(source, h.dataOffset, length, 'a text')).replace(/\0+$/, '');
  const view = viewOf(readExactly(source, h.dataOffset, 4 * length, 'a text'));
  const points = Array.from({ length }, (_, i) => view.getUint32(4 * i, m[1] !== '>'));
  return String.fromCodePoint(...points.filter((c) => c > 0 && c <= 0x10ffff));
}
