import { expect, test } from 'vitest';
import { dependencyOrder, withNeeds } from '../../src/core/recipe/order';
import type { Recipe, StepSpec } from '../../src/core/recipe/recipe';

const step = (id: string, ...of: string[]): StepSpec => ({ id, do: 'x', of, off: false, params: {} });
const recipe = (...steps: StepSpec[]): Recipe => ({ fringe: 1, inputs: {}, steps });

test('a step comes after all it needs, otherwise in document order', () => {
  const { order, cyclic } = dependencyOrder(recipe(step('c', 'b'), step('a'), step('b', 'a'), step('d')));
  expect(order.map((s) => s.id)).toEqual(['a', 'b', 'c', 'd']);
  expect(cyclic).toEqual([]);
});

test('cycles are named and do not hang', () => {
  const { cyclic } = dependencyOrder(
    recipe(step('a', 'c'), step('b', 'a'), step('c', 'b'), step('d', 'd'), step('e')),
  );
  expect(cyclic.sort()).toEqual(['a', 'b', 'c', 'd']);
});

test('what a step needs, all the way down', () => {
  const needs = withNeeds(recipe(step('a'), step('b', 'a'), step('c', 'b'), step('d')), ['c']);
  expect([...needs].sort()).toEqual(['a', 'b', 'c']);
});
