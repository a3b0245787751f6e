import { copyFileSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { Engine } from '../../src/core/recipe/engine';
import { parseRecipe } from '../../src/core/recipe/parse';
import { verify } from '../../src/core/recipe/verify';
import { nodeHost } from '../../src/host/node-host';
import { makeSamples, npyBytes, type Case } from './data';

// One folder, one case: case.json says how its data.npy is made and which warnings it must give, recipe.fringe.json
// what to do and which numbers to expect.
const here = new URL('.', import.meta.url).pathname;
const names = readdirSync(here, { withFileTypes: true }).flatMap((e) => (e.isDirectory() ? [e.name] : []));

let work = '';
let engine: Engine;
beforeAll(async () => {
  work = mkdtempSync(join(tmpdir(), 'fringeside-cases-'));
  engine = new Engine(await nodeHost(join(process.cwd(), 'dist')));
});
afterAll(() => rmSync(work, { recursive: true, force: true }));

test.each(names)('%s', async (name) => {
  const folder = join(here, name);
  const { data, warnings } = JSON.parse(readFileSync(join(folder, 'case.json'), 'utf8')) as Case;
  const recipe = join(work, `${name}.fringe.json`);
  copyFileSync(join(folder, 'recipe.fringe.json'), recipe);
  writeFileSync(join(work, 'data.npy'), npyBytes(makeSamples(data)));
  const text = readFileSync(recipe, 'utf8');
  const result = await engine.run({ text, folder: work }, { event: () => undefined, cancelled: () => false });
  expect(result.diagnostics).toEqual([]);
  expect(result.cards.map((c) => [c.id, c.state, c.error?.message])).toEqual(
    result.cards.map((c) => [c.id, 'done', undefined]),
  );
  expect(result.cards.flatMap((c) => c.warnings.map((w) => `${c.id}.${w.code}`)).sort()).toEqual(
    [...warnings].sort(),
  );
  const expectations = parseRecipe(text).recipe?.expect ?? {};
  expect(Object.keys(expectations).length).toBeGreaterThan(0);
  for (const v of verify(result, expectations))
    expect(v.ok, `${v.key}: found ${String(v.found)}, ${v.why}`).toBe(true);
});
