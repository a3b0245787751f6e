import { readdirSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { oracle, regenerate, scipyPython } from './oracle';

const topics = readdirSync(new URL('.', import.meta.url))
  .filter((f) => f.endsWith('.py'))
  .map((f) => f.slice(0, -3));
const found = scipyPython();

/** Largest difference of two JSON trees of numbers, relative to the largest magnitude in each array. */
function compare(a: unknown, b: unknown, at: string): void {
  if (Array.isArray(a) && Array.isArray(b)) {
    expect(a.length, at).toBe(b.length);
    if (a.every((v) => typeof v === 'number')) {
      const scale = Math.max(...a.map((v) => Math.abs(v)), Number.MIN_VALUE);
      a.forEach((v, i) => expect(Math.abs(v - (b[i] as number)) / scale, `${at}[${i}]`).toBeLessThan(1e-9));
    } else a.forEach((v, i) => compare(v, b[i], `${at}[${i}]`));
  } else if (typeof a === 'number' && typeof b === 'number') {
    expect(Math.abs(a - b) / Math.max(Math.abs(a), Number.MIN_VALUE), at).toBeLessThan(1e-9);
  } else if (a !== null && typeof a === 'object') {
    for (const [k, v] of Object.entries(a)) compare(v, (b as Record<string, unknown>)[k], `${at}.${k}`);
  } else expect(b, at).toEqual(a);
}

describe('committed oracle numbers equal what NumPy and SciPy give now', () => {
  if ('absent' in found) test.skip(`live comparison not run: ${found.absent}`, () => undefined);
  else
    test.each(topics)(
      '%s',
      (topic) => compare(oracle(topic), regenerate(found.python, topic), topic),
      120_000,
    );
});
