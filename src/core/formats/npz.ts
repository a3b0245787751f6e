import { arrayChannels, arrayReader, type StoredArray } from './array-channels';
import { startsWith, utf8 } from './bytes';
import { rankChannels } from './channel-choice';
import type { Clue } from './facts';
import type { ByteSource, FileNode, Format } from './format';
import { meaningOf } from './meaning';
import { readNpyHeader, shapeText, type NpyHeader } from './npy-header';
import { openChannels, type ReadableChannel } from './open-channels';
import { smallArray } from './small-array';
import { fitStamps, scaled, type TimeFit } from './time-axis';
import { memberBytes, zipMembers } from './zip';

interface Entry {
  readonly name: string;
  readonly header: NpyHeader;
  readonly source: ByteSource;
  readonly array: StoredArray | undefined;
}

/**
 * NumPy archive: each array is a channel (or several); single numbers and texts beside them, and a time array of the
 * same length, say rate, start and unit by their names. Compressed members are inflated as they are read, see inflated.ts.
 */
export const npzFormat: Format = {
  id: 'npz',
  title: 'NumPy archive',
  extensions: ['npz'],
  recognise(head, name) {
    const npz = /\.npz$/i.test(name);
    if (!startsWith(head, 'PK\x03\x04')) return npz ? 1 : 0;
    const first = utf8(head.subarray(30, 30 + (head[26] | (head[27] << 8))));
    return npz || first.endsWith('.npy') ? 2 : 0;
  },
  open(access) {
    const source = access.bytes();
    try {
      const others: FileNode[] = [];
      const entries: Entry[] = [];
      for (const m of zipMembers(source)) {
        if (m.name.endsWith('/')) continue;
        if (!m.name.endsWith('.npy')) {
          others.push({
            name: m.name,
            path: m.name,
            kind: 'other',
            detail: `${m.size} bytes`,
            attributes: [],
            children: [],
          });
          continue;
        }
        entries.push(entryOf(m.name.slice(0, -4), memberBytes(source, m)));
      }
      const clues = entries.flatMap(clueOf);
      const fits = new Map<Entry, TimeFit>();
      const channels = rankChannels(
        entries.flatMap((e) => (e.array ? arrayChannels(e.array, clues, timeFor(e, entries, fits)) : [])),
      );
      return openChannels(
        {
          format: npzFormat.title,
          name: access.name,
          size: access.size,
          tree: {
            name: access.name,
            path: '',
            kind: 'group',
            detail: '',
            attributes: [],
            children: [...entries.map((e) => nodeOf(e, channels)), ...others],
          },
          close: () => source.close(),
        },
        channels,
      );
    } catch (e) {
      source.close();
      throw e;
    }
  },
};

function entryOf(name: string, source: ByteSource): Entry {
  const header = readNpyHeader(source);
  const { type, littleEndian, shape, fortran, dataOffset } = header;
  const array =
    type === undefined ? undefined : { name, source, offset: dataOffset, type, littleEndian, shape, fortran };
  return { name, header, source, array };
}

function nodeOf(e: Entry, channels: readonly ReadableChannel[]): FileNode {
  const value = smallArray(e.source, e.header);
  const detail =
    value === undefined || e.header.shape.some((n) => n > 1)
      ? `${shapeText(e.header.shape)} ${e.header.type ?? e.header.descr}`
      : String(value);
  const mine = channels.find((c) => c.facts.name === e.name || c.facts.name.startsWith(`${e.name}[`));
  return {
    name: e.name,
    path: e.name,
    kind: e.array ? 'dataset' : 'other',
    detail,
    attributes: [],
    children: [],
    ...(mine ? { channel: mine.facts.name } : {}),
  };
}

function clueOf(e: Entry): Clue[] {
  const value = meaningOf(e.name) ? smallArray(e.source, e.header) : undefined;
  return value === undefined ? [] : [{ name: e.name, value, where: `array ${e.name}`, distance: 1 }];
}

/** Fit of a one-dimensional array of the same length whose name means time; each is fitted once. */
function timeFor(e: Entry, entries: readonly Entry[], fits: Map<Entry, TimeFit>): TimeFit | undefined {
  const length = Math.max(...e.header.shape, 0);
  const time = entries.find(
    (t) =>
      t !== e &&
      t.array !== undefined &&
      t.header.shape.length === 1 &&
      t.header.shape[0] === length &&
      length > 1 &&
      meaningOf(t.name)?.meaning === 'time-axis',
  );
  if (!time?.array || meaningOf(e.name)?.meaning === 'time-axis') return undefined;
  const known = fits.get(time);
  if (known) return known;
  const means = meaningOf(time.name)!;
  const fit = fitStamps({
    count: length,
    where: `array ${time.name}`,
    read: scaled(arrayReader(time.array, [0], 0), means.factor),
    ...(means.scale ? { scale: means.scale } : {}),
  });
  fits.set(time, fit);
  return fit;
}
