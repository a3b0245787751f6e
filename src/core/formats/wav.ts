import { UserError } from '../data/errors';
import { arrayReader } from './array-channels';
import { latin1, readExactly, startsWith, truncated, uint64, viewOf } from './bytes';
import type { ByteSource, ChannelFacts, Format } from './format';
import { openChannels } from './open-channels';
import type { NumberType } from './samples';

/** What the chunks of a WAVE file say (RIFF/WAVE, and RF64/BW64 of ITU-R BS.2088 for more than 4 GiB). */
interface WaveFacts {
  readonly type: NumberType;
  readonly littleEndian: boolean;
  readonly tracks: number;
  readonly rate: number;
  readonly dataOffset: number;
  readonly dataBytes: number;
  /** Divides integers to full scale 1; 1 for floats. */
  readonly fullScale: number;
  /** Added before dividing: 8-bit samples are unsigned about 128. */
  readonly zero: number;
  readonly notes: readonly string[];
}

/** WAVE audio, one channel per track, integers divided by their full scale so that they lie in [−1, 1). */
export const wavFormat: Format = {
  id: 'wav',
  title: 'WAVE audio',
  extensions: ['wav', 'wave', 'bw64', 'rf64'],
  recognise(head, name) {
    const form = latin1(head.subarray(0, 12));
    if (/^(RIFF|RIFX|RF64|BW64)[\s\S]{4}WAVE/.test(form)) return 2;
    return /\.(wave?|bw64|rf64)$/i.test(name) ? 1 : 0;
  },
  open(access) {
    const source = access.bytes();
    try {
      const facts = waveFacts(source);
      const size = facts.dataBytes;
      const bytes = { float64: 8, float32: 4, int32: 4, int24: 3, int16: 2, uint8: 1 }[facts.type as 'int16'];
      const length = Math.floor(size / bytes / facts.tracks);
      const { tracks, fullScale, zero } = facts;
      const channels = Array.from({ length: tracks }, (_, k) => {
        const name = `track ${k + 1}`;
        const read = arrayReader(
          {
            name,
            source,
            offset: facts.dataOffset,
            type: facts.type,
            littleEndian: facts.littleEndian,
            shape: [length, tracks],
            fortran: false,
          },
          [0, k],
          0,
        );
        const channel: ChannelFacts = {
          name,
          type: facts.type,
          shape: [length, tracks],
          length,
          rate: { value: facts.rate, where: 'rate of the "fmt " chunk' },
          unit: { value: 'full scale', where: 'WAVE convention: full scale is 1' },
          layout: { kind: 'track', track: k },
          notes: facts.notes,
        };
        return {
          facts: channel,
          read(from: number, to: number, into: Float64Array) {
            read(from, to, into);
            if (fullScale !== 1) for (let i = 0; i < to - from; i++) into[i] = (into[i] - zero) / fullScale;
          },
        };
      });
      return openChannels(
        {
          format: wavFormat.title,
          name: access.name,
          size: access.size,
          tree: {
            name: access.name,
            path: '',
            kind: 'group',
            detail: `${facts.rate} Hz`,
            attributes: [],
            children: channels.map((c) => ({
              name: c.facts.name,
              path: c.facts.name,
              kind: 'dataset' as const,
              detail: `${length} ${facts.type}`,
              attributes: [],
              channel: c.facts.name,
              children: [],
            })),
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

const PCM = 1;
const FLOAT = 3;
const EXTENSIBLE = 0xfffe;

function waveFacts(source: ByteSource): WaveFacts {
  const head = readExactly(source, 0, 12, 'the RIFF header');
  if (latin1(head.subarray(8, 12)) !== 'WAVE')
    throw wrong(source.name, 'it does not begin with a WAVE header');
  const little = !startsWith(head, 'RIFX');
  const wide = startsWith(head, 'RF64') || startsWith(head, 'BW64');
  let wideData: number | undefined;
  let form: DataView | undefined;
  for (let at = 12; at + 8 <= source.size;) {
    const chunk = readExactly(source, at, 8, 'a chunk header');
    const id = latin1(chunk.subarray(0, 4));
    let size = viewOf(chunk).getUint32(4, little);
    const body = at + 8;
    if (id === 'ds64') wideData = uint64(viewOf(readExactly(source, body, 24, 'the "ds64" chunk')), 8);
    if (id === 'fmt ') form = viewOf(readExactly(source, body, Math.min(size, 40), 'the "fmt " chunk'));
    if (id === 'data') {
      if (wide && size === 0xffffffff && wideData !== undefined) size = wideData;
      if (!form || form.byteLength < 16) throw wrong(source.name, 'the samples come before the "fmt " chunk');
      return dataFacts(source, form, little, body, size);
    }
    at = body + size + (size % 2);
  }
  throw wrong(source.name, 'it has no "data" chunk');
}

function dataFacts(
  source: ByteSource,
  form: DataView,
  little: boolean,
  offset: number,
  size: number,
): WaveFacts {
  const name = source.name;
  const stated = form.getUint16(0, little);
  const code = stated === EXTENSIBLE && form.byteLength >= 26 ? form.getUint16(24, little) : stated;
  const tracks = form.getUint16(2, little);
  const rate = form.getUint32(4, little);
  const align = form.getUint16(12, little);
  const bits = form.getUint16(14, little);
  if (rate === 0) throw wrong(name, 'the "fmt " chunk says a rate of 0 Hz');
  if (tracks === 0) throw wrong(name, 'the "fmt " chunk says 0 tracks');
  const container = align / tracks;
  const type = sampleType(code, container);
  if (!type)
    throw new UserError(
      'type-not-numeric',
      `${name} has samples of code ${code} with ${bits} bits; only integers of 8 to 32 and floats of 32 and 64 bits can be read. Convert it to 24-bit PCM.`,
      name,
    );
  if (offset + size > source.size && size !== 0xffffffff && size !== 0)
    throw truncated(name, offset + size, source.size, 'the "data" chunk');
  const dataBytes = size === 0xffffffff || size === 0 ? source.size - offset : size;
  const open =
    dataBytes === size
      ? []
      : ['The length of the "data" chunk was never written: everything up to the end of the file is read.'];
  const integer = !type.startsWith('float');
  // Samples with fewer bits than their container sit at its top (WAVE convention), so the container sets the scale.
  const fullScale = integer ? 2 ** (8 * container - 1) : 1;
  const scale = integer
    ? `Integer counts (${bits} bits) are divided by ${fullScale}: full scale is 1.`
    : 'Floats are read as stored; full scale is 1.';
  return {
    type,
    littleEndian: little,
    tracks,
    rate,
    dataOffset: offset,
    dataBytes,
    fullScale,
    zero: type === 'uint8' ? 128 : 0,
    notes: [scale, ...open],
  };
}

function sampleType(code: number, bytes: number): NumberType | undefined {
  if (code === FLOAT) return bytes === 4 ? 'float32' : bytes === 8 ? 'float64' : undefined;
  if (code !== PCM) return undefined;
  return ({ 1: 'uint8', 2: 'int16', 3: 'int24', 4: 'int32' } as const)[bytes as 1];
}

function wrong(name: string, why: string): UserError {
  return new UserError(
    'header-wrong',
    `${name} is a damaged WAVE file: ${why}. Write or copy the file again.`,
    name,
  );
}
