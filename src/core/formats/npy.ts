import { UserError } from '../data/errors';
import { arrayChannels } from './array-channels';
import { startsWith } from './bytes';
import type { Format } from './format';
import { NPY_MAGIC, readNpyHeader, shapeText } from './npy-header';
import { openChannels } from './open-channels';

/** NumPy array file: one array, its long axis is time. It carries no rate, start or unit; the user says them. */
export const npyFormat: Format = {
  id: 'npy',
  title: 'NumPy array',
  extensions: ['npy'],
  recognise: (head, name) => (startsWith(head, NPY_MAGIC) ? 2 : /\.npy$/i.test(name) ? 1 : 0),
  open(access) {
    const source = access.bytes();
    try {
      const h = readNpyHeader(source);
      const name = access.name.replace(/\.npy$/i, '');
      if (h.type === undefined)
        throw new UserError(
          'type-not-numeric',
          `${access.name} holds elements of type ${h.descr}, not plain real numbers. Save each real array by itself.`,
          access.name,
        );
      const channels = arrayChannels(
        {
          name,
          source,
          offset: h.dataOffset,
          type: h.type,
          littleEndian: h.littleEndian,
          shape: h.shape,
          fortran: h.fortran,
        },
        [],
      );
      const detail = `${shapeText(h.shape)} ${h.type}${h.fortran ? ', Fortran order' : ''}`;
      const first = channels.at(0)?.facts.name;
      return openChannels(
        {
          format: npyFormat.title,
          name: access.name,
          size: access.size,
          tree: {
            name,
            path: name,
            kind: 'dataset',
            detail,
            attributes: [],
            children: [],
            ...(first === undefined ? {} : { channel: first }),
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
