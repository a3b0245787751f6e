import { applyEdits, parse } from 'jsonc-parser';
import { describe, expect, test } from 'vitest';
import { editRecipe, type RecipeEdit } from '../../src/core/recipe/edit';

const text = `{
  "fringe": 1,
  // which data
  "inputs": { "a": { "file": "a.h5" } },
  "steps": [
    { "id": "noise", "do": "noise-spectrum", "of": ["a"] }, // the quiet part
    { "id": "look", "do": "overview", "of": ["a"], "off": true }
  ]
}
`;
interface Doc {
  inputs: Record<string, Record<string, unknown>>;
  steps: Record<string, unknown>[];
}
const apply = (edit: RecipeEdit, on = text): { text: string; doc: Doc } => {
  const after = applyEdits(on, editRecipe(on, edit));
  return { text: after, doc: parse(after) as Doc };
};

describe('editRecipe', () => {
  test('sets and removes parameters and keeps every comment', () => {
    const once = apply({ op: 'set', step: 'noise', params: { segment: 8, average: 'mean' } });
    expect(once.doc.steps[0]).toEqual({
      id: 'noise',
      do: 'noise-spectrum',
      of: ['a'],
      segment: 8,
      average: 'mean',
    });
    expect(once.text).toContain('// which data');
    expect(once.text).toContain('// the quiet part');
    const back = apply({ op: 'set', step: 'noise', params: { segment: undefined } }, once.text);
    expect(back.doc.steps[0]).toEqual({ id: 'noise', do: 'noise-spectrum', of: ['a'], average: 'mean' });
  });

  test('adds at the end with a free id, or at a place', () => {
    const added = apply({ op: 'add', step: { do: 'noise-spectrum', of: ['a'], id: 'noise-2' } });
    expect(added.doc.steps.map((s) => s['id'])).toEqual(['noise', 'look', 'noise-2']);
    const first = apply({ op: 'add', step: { do: 'look', of: ['a'], params: { x: 1 } }, at: 0 });
    expect(first.doc.steps.map((s) => s['id'])).toEqual(['look-2', 'noise', 'look']);
  });

  test('removes, duplicates, moves, switches on and off', () => {
    expect(apply({ op: 'remove', step: 'noise' }).doc.steps.map((s) => s['id'])).toEqual(['look']);
    expect(apply({ op: 'duplicate', step: 'noise' }).doc.steps.map((s) => s['id'])).toEqual([
      'noise',
      'noise-2',
      'look',
    ]);
    expect(apply({ op: 'move', step: 'look', to: 0 }).doc.steps.map((s) => s['id'])).toEqual([
      'look',
      'noise',
    ]);
    expect(apply({ op: 'off', step: 'look', off: false }).doc.steps[1]).not.toHaveProperty('off');
    expect(apply({ op: 'off', step: 'noise', off: true }).doc.steps[0]).toHaveProperty('off', true);
  });

  test('sets keys of an input', () => {
    expect(
      apply({ op: 'input', input: 'a', values: { rate: 4096, epoch: '1400000000' } }).doc.inputs['a'],
    ).toEqual({
      file: 'a.h5',
      rate: 4096,
      epoch: '1400000000',
    });
  });

  test('says when the step is gone', () => {
    expect(() => editRecipe(text, { op: 'remove', step: 'gone' })).toThrow(/no step "gone" any more/);
  });
});
