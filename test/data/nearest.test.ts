import { expect, test } from 'vitest';
import { editDistance, nearestNames } from '../../src/core/data/nearest';

test('edit distance counts insert, delete, replace and a swap of neighbours as one each', () => {
  expect(editDistance('strat', 'start')).toBe(1);
  expect(editDistance('kitten', 'sitting')).toBe(3);
  expect(editDistance('', 'abc')).toBe(3);
});

test('offers the nearest names, best first, and nothing far away', () => {
  expect(nearestNames('noise-spectum', ['overview', 'noise-spectrum', 'reference-noise'])[0]).toBe(
    'noise-spectrum',
  );
  expect(nearestNames('spectrum', ['overview', 'noise-spectrum'])).toEqual(['noise-spectrum']);
  expect(nearestNames('zzzz', ['overview'])).toEqual([]);
});
