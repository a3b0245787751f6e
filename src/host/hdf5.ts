import * as h5 from 'h5wasm/node';
import { UserError } from '../core/data/errors';
import type { Hdf5Attribute, Hdf5Dataset, Hdf5File, Hdf5Group } from '../core/formats/format';
import { captureMessages, reasonOf } from './hdf5-messages';
import { datasetReader } from './hdf5-read';
import { numericType, plainValue, typeText } from './hdf5-types';

let ready = false;

/** Loads the HDF5 library once; must be awaited before the first openHdf5. */
export async function initHdf5(): Promise<void> {
  await h5.ready;
  captureMessages();
  ready = true;
}

/** Object limit of a tree: a file with more is shown in part. */
const MOST_OBJECTS = 20_000;
/** Elements of a dataset or attribute that is shown as text. */
const SMALL = 64;

/**
 * Opens an HDF5 file read-only through the library, which reads host files by itself and lazily (no copy, any size).
 * `check` is called before each read and throws when the file has changed.
 */
export function openHdf5(path: string, name: string, check: () => void): Hdf5File {
  if (!ready) throw new Error('initHdf5 must be awaited before the first HDF5 file');
  const { result: file, messages } = captured(() => new h5.File(path, 'r'));
  if (file.file_id < 0n) {
    const reason = reasonOf(messages);
    const hint = /truncated/i.test(reason)
      ? 'Copy the file again.'
      : 'Check that it is a complete HDF5 file.';
    throw new UserError('file-damaged', `${name} cannot be opened as HDF5: ${reason}. ${hint}`, name);
  }
  let left = MOST_OBJECTS;
  let open = true;
  const context: Context = { file, name, check, take: () => left-- > 0, seen: new Map() };
  const close = (): void => {
    if (open) file.close();
    open = false;
  };
  try {
    context.seen.set(addressOf(context, '/'), '/');
    return { root: groupOf(context, '/'), close };
  } catch (e) {
    close();
    throw e;
  }
}

interface Context {
  readonly file: h5.File;
  readonly name: string;
  readonly check: () => void;
  /** False when the tree is full. */
  readonly take: () => boolean;
  /** Path of each object by its address, so that hard links do not show it twice or lead in circles. */
  readonly seen: Map<string, string>;
}

function captured<T>(run: () => T): { result: T; messages: string } {
  const stop = captureMessages();
  const result = run();
  return { result, messages: stop() };
}

function damaged(context: Context, path: string, messages: string): UserError {
  return new UserError(
    'file-damaged',
    `${context.name}: ${path} cannot be read: ${reasonOf(messages)}. Copy or write the file again.`,
    `${context.name} ${path}`,
  );
}

function groupOf(context: Context, path: string): Hdf5Group {
  const groups: Hdf5Group[] = [];
  const datasets: Hdf5Dataset[] = [];
  const others: { path: string; what: string }[] = [];
  const { Module: lib } = h5;
  const id = context.file.file_id;
  const { result: names, messages } = captured(() => {
    try {
      return lib.get_names(id, path, false);
    } catch {
      return undefined;
    }
  });
  if (!names) throw damaged(context, path, messages);
  for (const name of names) {
    const child = path === '/' ? `/${name}` : `${path}/${name}`;
    if (!context.take()) {
      others.push({ path: child, what: 'and more objects, not listed' });
      break;
    }
    const { result: kind } = captured(() => kindOf(context, child));
    if (typeof kind === 'string') others.push({ path: child, what: kind });
    else if (kind === lib.H5G_GROUP) groups.push(groupOf(context, child));
    else if (kind === lib.H5G_DATASET) datasets.push(datasetOf(context, child));
    else others.push({ path: child, what: kind === lib.H5G_TYPE ? 'named type' : 'unknown object' });
  }
  return { path, attributes: attributesOf(context, path), groups, datasets, others };
}

/** Class number of an object seen for the first time, or a word on the link that is not followed. */
function kindOf(context: Context, path: string): number | string {
  const { Module: lib } = h5;
  const id = context.file.file_id;
  const target = lib.get_symbolic_link(id, path) as string | null;
  if (target !== null) return `link to ${target}`;
  const kind = lib.get_type(id, path);
  if (kind === lib.H5G_UDLINK)
    return `link into another file (${lib.get_external_link(id, path).filename}), not followed`;
  if (kind < 0) return 'link to a missing object';
  const address = addressOf(context, path);
  const before = context.seen.get(address);
  if (before !== undefined) return `the same object as ${before}`;
  context.seen.set(address, path);
  return kind;
}

/** An object reference holds the address of the object's header, which is the same for every link to it. */
function addressOf(context: Context, path: string): string {
  return Buffer.from(h5.Module.create_object_reference(context.file.file_id, path)).toString('hex');
}

function datasetOf(context: Context, path: string): Hdf5Dataset {
  const { Module: lib } = h5;
  const id = context.file.file_id;
  const { result, messages } = captured(() => {
    try {
      return { meta: lib.get_dataset_metadata(id, path), filters: lib.get_dataset_filters(id, path) };
    } catch {
      return undefined;
    }
  });
  if (!result) throw damaged(context, path, messages);
  const { meta, filters } = result;
  const shape = meta.shape ?? [0];
  const parts = meta.virtual_sources?.map((v) => v.file_name) ?? [];
  return {
    path,
    shape,
    type: numericType(meta),
    typeText: typeText(meta),
    chunks: meta.chunks ?? undefined,
    filters: filters.map((f) => f.name || `filter ${f.id}`),
    attributes: attributesOf(context, path),
    notes:
      parts.length > 0
        ? [
            `Put together from ${[...new Set(parts)].slice(0, 3).join(', ')}: parts that are missing read as the fill value.`,
          ]
        : [],
    read: datasetReader(context, path, meta, filters),
    small() {
      if (meta.shape === null || meta.total_size > SMALL) return undefined;
      const { result: value } = captured(() => {
        try {
          return plainValue(new h5.Dataset(id, path).value);
        } catch {
          return undefined;
        }
      });
      return value;
    },
  };
}

function attributesOf(context: Context, path: string): Hdf5Attribute[] {
  const { Module: lib } = h5;
  const id = context.file.file_id;
  const { result: attributes } = captured(() => {
    try {
      return lib.get_attribute_names(id, path).flatMap((name): Hdf5Attribute[] => {
        try {
          const a = new h5.Attribute(id, path, name);
          if (a.metadata.shape === null || a.metadata.total_size > 4096)
            return [{ name, value: `(${typeText(a.metadata)})` }];
          return [{ name, value: plainValue(a.value) ?? `(${typeText(a.metadata)})` }];
        } catch {
          return [{ name, value: '(not readable)' }];
        }
      });
    } catch {
      return [];
    }
  });
  return attributes;
}
