import { UserError } from '../data/errors';
import { arrayReader } from './array-channels';
import { typeNotes } from './channel-choice';
import type { ChannelFacts, FileAccess, Format } from './format';
import { openChannels } from './open-channels';
import { parseSidecar, SIDECAR_EXAMPLE, type Sidecar } from './raw-sidecar';
import { SAMPLE_BYTES } from './samples';
import { utf8 } from './bytes';

/** Samples and nothing else; a JSON file of the same name plus ".json" says what they are. */
export const rawFormat: Format = {
  id: 'raw',
  title: 'Raw samples with a JSON sidecar',
  extensions: ['bin', 'raw', 'dat', 'f32', 'f64'],
  recognise: (_head, name) => (/\.(bin|raw|dat|f32|f64)$/i.test(name) ? 1 : 0),
  open(access) {
    const { sidecar, name: sidecarName } = readSidecar(access);
    const tracks = sidecar.channels?.length ?? 1;
    const frame = SAMPLE_BYTES[sidecar.type] * tracks;
    const bytes = access.size - sidecar.offset;
    if (bytes <= 0)
      throw new UserError(
        'sidecar-wrong',
        `${sidecarName}: "offset" ${sidecar.offset} is past the end of ${access.name} (${access.size} bytes).`,
        sidecarName,
      );
    const length = Math.floor(bytes / frame);
    const rest = bytes - length * frame;
    const over =
      rest > 0
        ? [
            `The last ${rest} bytes are no whole sample of ${frame} bytes and are left out: check "type" and "channels".`,
          ]
        : [];
    const source = access.bytes();
    const names = sidecar.channels ?? ['samples'];
    const channels = names.map((name, k) => {
      const facts: ChannelFacts = {
        name,
        type: sidecar.type,
        shape: tracks === 1 ? [length] : [length, tracks],
        length,
        ...(sidecar.rate === undefined
          ? {}
          : { rate: { value: sidecar.rate, where: `"rate" in ${sidecarName}` } }),
        ...(sidecar.start === undefined
          ? {}
          : {
              start: { value: sidecar.start.time, where: `"start" in ${sidecarName}, ${sidecar.start.how}` },
            }),
        ...(sidecar.unit === undefined
          ? {}
          : { unit: { value: sidecar.unit, where: `"unit" in ${sidecarName}` } }),
        layout: {
          kind: 'raw',
          littleEndian: sidecar.littleEndian,
          offset: sidecar.offset,
          tracks,
          track: k,
        },
        notes: [...typeNotes(sidecar.type), ...over],
      };
      const read = arrayReader(
        {
          name,
          source,
          offset: sidecar.offset,
          type: sidecar.type,
          littleEndian: sidecar.littleEndian,
          shape: [length, tracks],
          fortran: false,
        },
        [0, k],
        0,
      );
      return { facts, read };
    });
    return openChannels(
      {
        format: rawFormat.title,
        name: access.name,
        size: access.size,
        tree: {
          name: access.name,
          path: '',
          kind: 'group',
          detail: `${sidecar.type}, ${sidecar.littleEndian ? 'little' : 'big'}-endian`,
          attributes: [],
          children: channels.map((c) => ({
            name: c.facts.name,
            path: c.facts.name,
            kind: 'dataset' as const,
            detail: `${length} samples`,
            attributes: [],
            channel: c.facts.name,
            children: [],
          })),
        },
        close: () => source.close(),
      },
      channels,
    );
  },
};

/** "run.f64.json", or "run.json" beside "run.f64". */
function readSidecar(access: FileAccess): { sidecar: Sidecar; name: string } {
  const stem = access.name.replace(/\.[^.]*$/, '');
  for (const name of [`${access.name}.json`, `${stem}.json`]) {
    const source = access.sibling(name);
    if (!source) continue;
    try {
      return { sidecar: parseSidecar(utf8(source.read(0, 1 << 20)), name), name };
    } finally {
      source.close();
    }
  }
  throw new UserError(
    'sidecar-missing',
    `${access.name} is raw samples, and no ${stem}.json beside it says which. Write one, for example ${SIDECAR_EXAMPLE}`,
    access.name,
  );
}
