import { execFileSync } from 'node:child_process';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { stepSources } from '../src/core/python';
import { steps } from '../src/core/steps';

const ids = Object.keys(steps).sort();
const stepFiles = readdirSync('src/core/steps')
  .map((f) => f.replace(/\.ts$/, ''))
  .filter((f) => !['index', 'define'].includes(f))
  .sort();

describe('steps = files = docs = tests', () => {
  test('every file in src/core/steps is registered under its own name', () => {
    expect(ids).toEqual(stepFiles);
    for (const [id, step] of Object.entries(steps)) expect(step.id).toBe(id);
  });

  test('every step has a test file', () => {
    expect(ids.filter((id) => !existsSync(`test/steps/${id}.test.ts`))).toEqual([]);
  });

  test('every step has an equivalent in Python, or a reason why not', () => {
    const without: Readonly<Record<string, string>> = {};
    expect(ids.filter((id) => !Object.hasOwn(stepSources, id) && !Object.hasOwn(without, id))).toEqual([]);
    expect(Object.keys(stepSources).filter((id) => !ids.includes(id))).toEqual([]);
  });

  test('every step and every parameter is in the step reference and the schema', () => {
    const docs = readFileSync('docs/steps.md', 'utf8');
    const schema = readFileSync('media/recipe.schema.json', 'utf8');
    for (const step of Object.values(steps)) {
      expect(docs).toContain(`## ${step.id}\n`);
      for (const key of Object.keys(step.params)) {
        expect(docs, `${step.id}.${key}`).toContain(`\`${key}\``);
        expect(schema, `${step.id}.${key}`).toContain(`"${key}":`);
      }
    }
  });

  test('generated files are up to date', () => {
    expect(() => execFileSync('node', ['scripts/sync.mjs', '--check'], { stdio: 'pipe' })).not.toThrow();
  });
});

describe.each(Object.values(steps))('$id', (step) => {
  test('is fully described', () => {
    expect(step.title).toMatch(/^[A-Z]/);
    expect(step.summary).toMatch(/^[A-Z].*\.$/);
    expect(step.sources.length).toBeGreaterThan(0);
    for (const [key, p] of Object.entries(step.params)) {
      expect(key).toMatch(/^[a-z][a-z0-9-]*$/);
      expect(p.help, key).toMatch(/\.$/);
      expect(['id', 'do', 'of', 'off']).not.toContain(key);
      if (p.kind === 'choice') expect(p.choices).toContain(p.default);
      if (p.kind === 'number' && p.default !== null) {
        expect(p.default).toBeGreaterThanOrEqual(p.min ?? -Infinity);
        expect(p.default).toBeLessThanOrEqual(p.max ?? Infinity);
      }
    }
  });
});
