import { UserError } from '../data/errors';
import type { Format } from './format';
import { hdf5Format } from './hdf5';
import { npyFormat } from './npy';
import { npzFormat } from './npz';
import { rawFormat } from './raw';
import { textFormat } from './text';
import { wavFormat } from './wav';

/** Every format that can be opened. A new format is one more entry; nothing else changes. */
export const FORMATS: readonly Format[] = [
  hdf5Format,
  npyFormat,
  npzFormat,
  wavFormat,
  textFormat,
  rawFormat,
];

/** Bytes of the head that `recognise` wants to see. */
export const HEAD_BYTES = 8192;

/** The format whose content or, failing that, whose name fits; a UserError listing what there is when none does. */
export function recogniseFormat(head: Uint8Array, name: string): Format {
  let best: Format | undefined;
  let sure = 0;
  for (const format of FORMATS) {
    const s = format.recognise(head, name);
    if (s > sure) [best, sure] = [format, s];
  }
  if (best) return best;
  const known = FORMATS.map((f) => `${f.title} (.${f.extensions.join(', .')})`).join('; ');
  throw new UserError(
    'format-unknown',
    `${name} is in no format that can be opened. Supported are ${known}.`,
    name,
  );
}
