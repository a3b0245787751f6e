import { expect, test } from 'vitest';
import { independentGroups } from '../../src/core/recipe/components';
import type { Recipe, StepSpec } from '../../src/core/recipe/recipe';

const step = (id: string, of: string[], off = false): StepSpec => ({ id, do: 'x', of, off, params: {} });
const recipe = (...steps: StepSpec[]): Recipe => ({ fringe: 1, inputs: {}, steps });

test('steps of two sites are two groups until one takes both', () => {
  const two = [step('a1', ['a']), step('b1', ['b']), step('a2', ['a1']), step('b2', ['b', 'b1'])];
  expect(independentGroups(recipe(...two))).toEqual([
    ['a1', 'a2'],
    ['b1', 'b2'],
  ]);
  expect(independentGroups(recipe(...two, step('c', ['a2', 'b2'])))).toEqual([['a1', 'b1', 'a2', 'b2', 'c']]);
  expect(independentGroups(recipe(...two, step('c', ['a2', 'b2'], true)))).toHaveLength(2);
});

test('a step that feeds on itself does not hang', () => {
  expect(independentGroups(recipe(step('a', ['b']), step('b', ['a']), step('c', ['c'])))).toEqual([
    ['a', 'b'],
    ['c'],
  ]);
});
