import { describe, expect, it } from 'vitest';
import type { Card, StepDescription } from '../../src/core/protocol/engine';
import { parseRecipe } from '../../src/core/recipe/parse';
import type { Recipe } from '../../src/core/recipe/recipe';
import { readInstant } from '../../src/extension/instant';
import { addableSteps, namedKinds } from '../../src/extension/look/addable';
import { outsidePaths } from '../../src/extension/look/outside-paths';
import { Results } from '../../src/extension/look/results';
import { stepSignatures } from '../../src/extension/look/signatures';

function recipe(steps: string, inputs = '"alder": { "file": "alder.h5" }'): Recipe {
  const parsed = parseRecipe(`{ "fringe": 1, "inputs": { ${inputs} }, "steps": [${steps}] }`);
  if (!parsed.recipe) throw new Error(parsed.diagnostics.map((d) => d.message).join());
  return parsed.recipe;
}

const CHAIN = `{ "id": "clean", "do": "band-pass", "of": ["alder"], "low": 30 },
  { "id": "noise", "do": "noise-spectrum", "of": ["clean"] },
  { "id": "raw", "do": "noise-spectrum", "of": ["alder"] }`;

describe('signatures', () => {
  const before = stepSignatures(recipe(CHAIN), 0);
  const changed = (steps: string, inputs?: string, generation = 0): string[] => {
    const after = stepSignatures(recipe(steps, inputs), generation);
    return [...after].filter(([id, s]) => before.get(id) !== s).map(([id]) => id);
  };

  it('change for a step and all that consumes it, and for nothing else', () => {
    expect(changed(CHAIN)).toEqual([]);
    expect(changed(CHAIN.replace('"low": 30', '"low": 40'))).toEqual(['clean', 'noise']);
    expect(changed(CHAIN.replace('"of": ["alder"] }', '"of": ["alder"], "segment": 8 }'))).toEqual(['raw']);
  });
  it('change for every step when an input or a file changes', () => {
    expect(changed(CHAIN, '"alder": { "file": "alder.h5", "duration": 8 }')).toHaveLength(3);
    expect(changed(CHAIN, undefined, 1)).toHaveLength(3);
  });
  it('do not care for the order of parameters', () => {
    const a = stepSignatures(recipe('{ "id": "a", "do": "x", "of": [], "p": 1, "q": 2 }'), 0);
    const b = stepSignatures(recipe('{ "id": "a", "do": "x", "of": [], "q": 2, "p": 1 }'), 0);
    expect(a.get('a')).toBe(b.get('a'));
  });
  it('end on a cycle', () => {
    const loop = recipe('{ "id": "a", "do": "x", "of": ["b"] }, { "id": "b", "do": "x", "of": ["a"] }');
    expect(stepSignatures(loop, 0).size).toBe(2);
  });
});

const step = (id: string, takes: StepDescription['takes'], gives: string): StepDescription => ({
  id,
  title: id,
  version: 1,
  group: 'noise',
  summary: '',
  takes,
  gives,
  params: id === 'reference-noise' ? { file: { kind: 'file', label: 'File', help: '', default: '' } } : {},
  sources: [],
});
const STEPS = [
  step('band-pass', [{ kind: 'series', count: 'one', help: '' }], 'series'),
  step('noise-spectrum', [{ kind: 'series', count: 'one', help: '' }], 'spectrum'),
  step(
    'coherence',
    [
      { kind: 'series', count: 'one', help: '' },
      { kind: 'series', count: 'one', help: '' },
    ],
    'spectrum',
  ),
  step('compare-noise', [{ kind: 'spectrum', count: 'many', help: '' }], 'spectrum'),
  step('reference-noise', [{ kind: 'spectrum', count: 'optional', help: '' }], 'spectrum'),
];

describe('steps that can be added', () => {
  const offers = (r: Recipe): Record<string, readonly string[]> =>
    Object.fromEntries(addableSteps(r, STEPS).map((a) => [a.do, a.of]));

  it('take the newest data of each kind, and every one where many fit', () => {
    expect(offers(recipe(CHAIN))).toEqual({
      'band-pass': ['clean'],
      'noise-spectrum': ['clean'],
      coherence: ['clean', 'alder'],
      'compare-noise': ['raw', 'noise'],
      'reference-noise': [],
    });
  });
  it('leave out what the data cannot feed, and steps that are off', () => {
    const off = recipe('{ "id": "noise", "do": "noise-spectrum", "of": ["alder"], "off": true }');
    expect(Object.keys(offers(off))).toEqual(['band-pass', 'noise-spectrum', 'reference-noise']);
  });
  it('know the kind behind every name', () => {
    expect(namedKinds(recipe(CHAIN), STEPS)).toEqual([
      { name: 'alder', kind: 'series' },
      { name: 'clean', kind: 'series' },
      { name: 'noise', kind: 'spectrum' },
      { name: 'raw', kind: 'spectrum' },
    ]);
  });
});

describe('paths outside a folder that is not trusted', () => {
  const outside = (file: string, extra = ''): string[] =>
    outsidePaths(
      recipe(
        `{ "id": "r", "do": "reference-noise", "of": [], "file": "${extra}" }`,
        `"a": { "file": "${file}" }`,
      ),
      '/work/looks',
      ['/work'],
      STEPS,
    );
  it('are found in inputs and in parameters that name files', () => {
    expect(outside('../data/alder.h5')).toEqual([]);
    expect(outside('../../etc/alder.h5')).toEqual(['../../etc/alder.h5']);
    expect(outside('/elsewhere/alder.h5', '/etc/curve.txt')).toEqual([
      '/elsewhere/alder.h5',
      '/etc/curve.txt',
    ]);
    expect(outside('/work/..data/alder.h5')).toEqual([]);
  });
});

const card = (id: string, state: Card['state'] = 'done'): Card => ({
  id,
  do: 'x',
  title: 'X',
  of: [],
  state,
  sentence: '',
  numbers: [],
  warnings: [],
  figures: [],
  tables: [],
});

describe('results of a look', () => {
  function ran(): Results {
    const results = new Results();
    results.setSignatures(
      new Map([
        ['a', '1'],
        ['b', '1'],
      ]),
    );
    results.apply({ type: 'waiting', ids: ['a', 'b'] });
    results.apply({ type: 'card', card: card('a') });
    results.apply({ type: 'card', card: card('b') });
    return results;
  }
  const states = (r: Results): string[] => ['a', 'b'].map((id) => r.head(id, false).state);

  it('go stale with their step alone, and all of them while the text is broken', () => {
    const results = ran();
    expect(states(results)).toEqual(['done', 'done']);
    results.setSignatures(
      new Map([
        ['a', '1'],
        ['b', '2'],
      ]),
    );
    expect(states(results)).toEqual(['done', 'stale']);
    results.broken = true;
    expect(states(results)).toEqual(['stale', 'stale']);
    expect(results.card('b')).toBeDefined();
  });
  it('wait and run only where they are not current', () => {
    const results = ran();
    results.setSignatures(
      new Map([
        ['a', '1'],
        ['b', '2'],
      ]),
    );
    results.apply({ type: 'waiting', ids: ['a', 'b'] });
    expect(states(results)).toEqual(['done', 'waiting']);
    results.apply({ type: 'running', id: 'b', fraction: 0.5, note: 'averaging' });
    expect(results.head('b', false)).toEqual({ state: 'running', fraction: 0.5, note: 'averaging' });
  });
  it('keep a current result when a run is stopped before it comes to that step', () => {
    const results = ran();
    results.setSignatures(
      new Map([
        ['a', '1'],
        ['b', '2'],
      ]),
    );
    results.apply({ type: 'waiting', ids: ['a', 'b'] });
    results.apply({ type: 'card', card: card('a', 'cancelled') });
    results.apply({ type: 'card', card: card('b', 'cancelled') });
    expect(states(results)).toEqual(['done', 'cancelled']);
  });
  it('fail with the reason when the engine dies', () => {
    const results = ran();
    results.setSignatures(
      new Map([
        ['a', '1'],
        ['b', '2'],
      ]),
    );
    results.apply({ type: 'waiting', ids: ['b'] });
    results.stop('failed', { code: 'engine', message: 'the engine stopped' });
    expect(results.head('b', false)).toMatchObject({
      state: 'failed',
      failure: { message: 'the engine stopped' },
    });
    expect(states(results)[0]).toBe('done');
  });
  it('forget steps that are gone and take no card for them', () => {
    const results = ran();
    results.setSignatures(new Map([['a', '1']]));
    expect(results.card('b')).toBeUndefined();
    expect(results.apply({ type: 'card', card: card('b') })).toEqual({ heads: false });
  });
});

describe('instants', () => {
  it.each([
    // 2017-01-01: the last leap second of the table; GPS − UTC goes from 17 to 18 s (IERS Bulletin C 52, MEMORY).
    ['2016-12-31T23:59:59Z', '1167264016'],
    ['2016-12-31T23:59:60Z', '1167264017'],
    ['2017-01-01T00:00:00', '1167264018'],
    ['1980-01-06', '0'],
    ['2024-05-17 16:53:02.25', '1400000000.25'],
  ])('reads UTC %s as GPS %s', (utc, gps) => expect(readInstant(utc)?.gps).toBe(gps));
  it('reads GPS seconds and keeps nanoseconds', () => {
    expect(readInstant('1400000000.000000001')).toEqual({
      from: 'gps',
      gps: '1400000000.000000001',
      utc: '2024-05-17T16:53:02.000000001Z',
    });
  });
  it('cautions after the end of the leap-second table', () => {
    expect(readInstant('1600000000')?.caution).toContain('leap-second table');
  });
  it.each(['', 'noon', '2024-02-30T00:00:00', '2024-05-17T25:00', '2020-05-17T12:00:60', '1,5'])(
    'refuses "%s"',
    (text) => expect(readInstant(text)).toBeUndefined(),
  );
});
