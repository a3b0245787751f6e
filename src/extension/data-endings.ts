/** Endings of the files that the data view and looks offer to open; readers decide by content. */
export const DATA_ENDINGS: readonly string[] = [
  'h5',
  'hdf5',
  'npy',
  'npz',
  'csv',
  'tsv',
  'txt',
  'gz',
  'wav',
  'bin',
  'raw',
  'dat',
  'f32',
  'f64',
];

export const isDataFile = (path: string): boolean =>
  DATA_ENDINGS.some((e) => path.toLowerCase().endsWith(`.${e}`));
