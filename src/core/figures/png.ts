import { zlibSync } from 'fflate';
import { crc32 } from '../formats/crc32';

const SIGNATURE = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];

/** Pixels (red, green, blue, opacity; rows from the top) as a PNG file (ISO/IEC 15948): the same pixels give the same bytes. */
export function pngOf(rgba: Uint8Array, width: number, height: number): Uint8Array {
  const lines = new Uint8Array(height * (4 * width + 1));
  // Each line begins with its filter: 0, none.
  for (let y = 0; y < height; y++)
    lines.set(rgba.subarray(4 * width * y, 4 * width * (y + 1)), y * (4 * width + 1) + 1);
  const header = new Uint8Array(13);
  const view = new DataView(header.buffer);
  view.setUint32(0, width);
  view.setUint32(4, height);
  header.set([8, 6, 0, 0, 0], 8);
  const chunks = [
    chunk('IHDR', header),
    chunk('IDAT', zlibSync(lines, { level: 6 })),
    chunk('IEND', new Uint8Array(0)),
  ];
  const out = new Uint8Array(SIGNATURE.length + chunks.reduce((n, c) => n + c.length, 0));
  out.set(SIGNATURE);
  let at = SIGNATURE.length;
  for (const c of chunks) {
    out.set(c, at);
    at += c.length;
  }
  return out;
}

function chunk(type: string, data: Uint8Array): Uint8Array {
  const out = new Uint8Array(12 + data.length);
  const view = new DataView(out.buffer);
  view.setUint32(0, data.length);
  for (let i = 0; i < 4; i++) out[4 + i] = type.charCodeAt(i);
  out.set(data, 8);
  view.setUint32(8 + data.length, crc32(out.subarray(4, 8 + data.length)));
  return out;
}

const LETTERS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

/** Bytes as a data URL of an image. */
export function pngUrl(png: Uint8Array): string {
  let text = '';
  for (let i = 0; i < png.length; i += 3) {
    const n = (png[i] << 16) | ((png[i + 1] ?? 0) << 8) | (png[i + 2] ?? 0);
    text += LETTERS[n >> 18] + LETTERS[(n >> 12) & 63];
    text += i + 1 < png.length ? LETTERS[(n >> 6) & 63] : '=';
    text += i + 2 < png.length ? LETTERS[n & 63] : '=';
  }
  return `data:image/png;base64,${text}`;
}
