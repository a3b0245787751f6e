import { describe, expect, test } from 'vitest';
import { parseRecipe } from '../../src/core/recipe/parse';

const good = `{
  // comments are allowed
  "fringe": 1,
  "inputs": { "alder": { "file": "alder.h5", "start": "1400000000.000000001" } },
  "steps": [ { "id": "look", "do": "overview", "of": "alder", "bins": 3 }, ],
  "expect": { "look.rms": { "value": 1e-21, "rel": 0.1 } }
}`;

const codes = (text: string): string[] => parseRecipe(text).diagnostics.map((d) => d.code);

describe('parseRecipe', () => {
  test('reads comments, trailing commas, one name in "of", and keeps unknown step keys as parameters', () => {
    const { recipe, diagnostics } = parseRecipe(good);
    expect(diagnostics).toEqual([]);
    expect(recipe?.steps).toEqual([
      { id: 'look', do: 'overview', of: ['alder'], off: false, params: { bins: 3 } },
    ]);
    expect(recipe?.inputs['alder']?.start).toBe('1400000000.000000001');
    expect(recipe?.expect).toEqual({ 'look.rms': { value: 1e-21, rel: 0.1 } });
  });

  test('a mistyped key is an error at its place, with the nearest known name', () => {
    const text = good.replace('"start"', '"strat"');
    const [d] = parseRecipe(text).diagnostics;
    expect(d).toMatchObject({ code: 'unknown-key', suggestions: ['start'], line: 4, subject: 'alder' });
    expect(text.slice(d.from, d.to)).toBe('"strat"');
  });

  test.each([
    ['', 'json'],
    ['[]', 'json'],
    ['{"fringe": 1, "inputs": {}, "steps": []', 'json'],
    ['{"fringe": 2, "inputs": {}, "steps": []}', 'version'],
    ['{"inputs": {}, "steps": []}', 'missing-key'],
    ['{"fringe": 1, "inputs": {}}', 'missing-key'],
    ['{"fringe": 1, "inputs": [], "steps": []}', 'wrong-type'],
    ['{"fringe": 1, "inputs": {"a": {"file": "x", "rate": 0}}, "steps": []}', 'wrong-value'],
    ['{"fringe": 1, "inputs": {"a": {"file": "x", "start": "yesterday"}}, "steps": []}', 'wrong-value'],
    ['{"fringe": 1, "inputs": {"a": {"file": "x", "scale": 0}}, "steps": []}', 'wrong-value'],
    ['{"fringe": 1, "inputs": {"a b": {"file": "x"}}, "steps": []}', 'bad-name'],
    [
      '{"fringe": 1, "inputs": {"a": {"file": "x"}}, "steps": [{"id": "a", "do": "overview"}]}',
      'duplicate-id',
    ],
    [
      '{"fringe": 1, "inputs": {"a": {"file": "x"}}, "steps": [{"id": "b", "do": "overview", "off": 1}]}',
      'wrong-type',
    ],
    ['{"fringe": 1, "inputs": {"a": {"file": "x", "file": "y"}}, "steps": []}', 'duplicate-key'],
    ['{"fringe": 1, "inputs": {}, "steps": [], "expect": {"x": 3}}', 'wrong-type'],
  ])('%s gives %s', (text, code) => {
    expect(codes(text)).toContain(code);
  });

  test('text that is not whole JSON never runs, whatever could be guessed from it', () => {
    expect(parseRecipe(good.slice(0, -1)).recipe).toBeUndefined();
  });

  test('absurdly deep nesting is refused without a stack overflow', () => {
    expect(codes(`{"fringe": ${'['.repeat(100_000)}`)).toEqual(['json']);
  });

  test('never throws, whatever prefix of a document it is given', () => {
    for (let n = 0; n < good.length; n++) expect(() => parseRecipe(good.slice(0, n))).not.toThrow();
  });
});
