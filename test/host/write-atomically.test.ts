import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { UserError } from '../../src/core/data/errors';
import { writeAtomically } from '../../src/host/write-atomically';

let folder = '';
beforeEach(() => (folder = mkdtempSync(join(tmpdir(), 'fringeside-write-'))));
afterEach(() => rmSync(folder, { recursive: true, force: true }));

test('writes into a folder that did not exist, replaces what is there, leaves nothing beside it', () => {
  const path = join(folder, 'a', 'b', 'result.json');
  writeAtomically(path, 'one');
  writeAtomically(path, 'two');
  expect(readFileSync(path, 'utf8')).toBe('two');
  expect(readdirSync(join(folder, 'a', 'b'))).toEqual(['result.json']);
});

test('a place that cannot be written gives one clear error and leaves nothing', () => {
  writeFileSync(join(folder, 'file'), 'old');
  for (const path of [join(folder, 'file', 'result.json'), folder]) {
    expect(() => writeAtomically(path, 'new')).toThrow(UserError);
    expect(() => writeAtomically(path, 'new')).toThrow(/cannot be written/);
  }
  expect(readdirSync(folder)).toEqual(['file']);
  expect(readFileSync(join(folder, 'file'), 'utf8')).toBe('old');
});
