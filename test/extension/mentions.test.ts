import { expect, test } from 'vitest';
import { mentionAt, mentionsIn } from '../../src/extension/scripts/mentions';

const texts = (line: string): string[] => mentionsIn(line).map((m) => `${m.kind} ${m.text}`);

test('paths of data files are found quoted, with blanks, bare and in Markdown', () => {
  expect(texts('open("data/run 7/alder.h5")')).toEqual(['file data/run 7/alder.h5']);
  expect(texts("np.load('x.npy'), np.load('../y.NPZ')")).toEqual(['file x.npy', 'file ../y.NPZ']);
  expect(texts('cat ~/strain/birch.csv.gz > out')).toEqual(['file ~/strain/birch.csv.gz']);
  expect(texts('See [the file](data/alder.h5) and `birch.wav`.')).toEqual([
    'file data/alder.h5',
    'file birch.wav',
  ]);
  expect(texts('x.h5py = 1; image.png')).toEqual([]);
});

test('numbers that can be GPS seconds are times; longer, shorter and glued ones are not', () => {
  expect(texts('t0 = 1400000168.42')).toEqual(['gps 1400000168.42']);
  expect(texts('t0 = 1_400_000_168')).toEqual(['gps 1400000168']);
  expect(texts('n = 123456789012; seed = 12345678; a1400000168 = 1400000168e3')).toEqual([]);
  expect(texts('mask = 4000000000')).toEqual([]);
  // A number inside a file's name belongs to the name.
  expect(texts('"alder-1400000000-256.h5"')).toEqual(['file alder-1400000000-256.h5']);
});

test('the mention under a column, its ends included', () => {
  const line = 't0 = 1400000168.42  # start';
  expect(mentionAt(line, 5)?.text).toBe('1400000168.42');
  expect(mentionAt(line, 18)?.text).toBe('1400000168.42');
  expect(mentionAt(line, 20)).toBeUndefined();
});
