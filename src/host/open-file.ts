import type { OpenFile } from '../core/formats/format';
import { HEAD_BYTES, recogniseFormat } from '../core/formats/index';
import { fileAccess } from './file-access';
import { initHdf5 } from './hdf5';

/** Loads what the readers need (the HDF5 library, about 0.1 s); await once before openDataFile. */
export async function initReaders(): Promise<void> {
  await initHdf5();
}

/**
 * Opens a data file of any supported format for reading by span. Throws a UserError naming file and place when it
 * cannot be opened; the caller closes the file.
 */
export function openDataFile(path: string): OpenFile {
  const access = fileAccess(path);
  return recogniseFormat(access.head(HEAD_BYTES), access.name).open(access);
}
