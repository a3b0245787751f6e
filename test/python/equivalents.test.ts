import { expect, test } from 'vitest';
import { pythonName } from '../../src/core/export/arguments';
import { calledShared, pythonSource } from '../../src/core/export/source';
import { shared, stepSources } from '../../src/core/python';
import { steps } from '../../src/core/steps';
import type { AnyStep } from '../../src/core/steps/define';

const registry: Readonly<Record<string, AnyStep>> = steps;
/** What a function may ask for besides its step's parameters. */
const BESIDES = ['spectra'];

test.each(Object.keys(stepSources))('%s takes its step’s inputs and parameters', (id) => {
  expect(Object.keys(registry)).toContain(id);
  const step = registry[id];
  const source = pythonSource(stepSources[id], id);
  const wanted = Object.entries(step.params).map(([key, p]) => pythonName(key, p, source.keywords));
  expect([...source.keywords].filter((k) => !BESIDES.includes(k)).sort()).toEqual([...wanted].sort());
  const places = step.takes
    .filter((t) => t.count !== 'optional' || !source.variadic)
    .map((t) => (t.count === 'many' ? 1 : t.kind === 'series' ? 3 : t.kind === 'spectrum' ? 2 : 1));
  expect(source.positional).toHaveLength(places.reduce((a, b) => a + b, 0));
  expect(source.body).toMatch(/^def \w+\([\s\S]*?\):(?: {2}# fmt: skip)?\n {4}"""/);
});

test.each(Object.keys(shared))('shared %s is called and described', (name) => {
  const all = [
    ...Object.values(stepSources),
    ...Object.entries(shared)
      .filter(([n]) => n !== name)
      .map(([, s]) => s),
  ];
  expect(calledShared(all.join('\n'), shared)).toContain(name);
  expect(pythonSource(shared[name], name).body).toMatch(/^def \w+\([\s\S]*?\):\n {4}"""/);
});
