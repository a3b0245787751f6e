import { expect, test } from 'vitest';
import { ByteCache, bytesOf } from '../../src/core/recipe/cache';

test('drops the least recently used value when the limit is passed', () => {
  const cache = new ByteCache<string>(100);
  cache.set('a', 'A', 40);
  cache.set('b', 'B', 40);
  expect(cache.get('a')).toBe('A');
  cache.set('c', 'C', 40);
  expect(cache.get('b')).toBeUndefined();
  expect(cache.get('a')).toBe('A');
  expect(cache.bytes).toBe(80);
});

test('a value larger than the limit is kept alone, and replacing one does not count twice', () => {
  const cache = new ByteCache<string>(100);
  cache.set('a', 'A', 40);
  cache.set('big', 'B', 400);
  expect([cache.get('a'), cache.get('big'), cache.bytes]).toEqual([undefined, 'B', 400]);
  cache.set('big', 'C', 10);
  expect(cache.bytes).toBe(10);
});

test('counts every array once, and survives cycles', () => {
  const a = new Float64Array(10);
  const loop: Record<string, unknown> = { a, again: { a }, list: [new Uint8Array(3)] };
  loop['self'] = loop;
  expect(bytesOf(loop)).toBe(83);
});
