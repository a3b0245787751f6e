import { expect, test } from 'vitest';
import type { Card, RunResult } from '../../src/core/protocol/engine';
import { vettingText } from '../../src/host/cli/vetting-text';

const card = (id: string, of: readonly string[], more: Partial<Card>): Card => ({
  id,
  do: '',
  title: '',
  of,
  state: 'done',
  sentence: '',
  numbers: [],
  warnings: [],
  figures: [],
  tables: [],
  ...more,
});
const ids = ['gps', 'snr', 'reduced', 'p-value', 'reweighted', 'shape-p-value'];
const table = (rows: readonly (readonly (string | number)[])[]) => ({
  kind: 'table' as const,
  id: 'consistency',
  title: '',
  columns: ids.map((id) => ({ id, label: id, unit: '' })),
  rows,
});
const result = (cards: readonly Card[]): RunResult => ({
  cards,
  diagnostics: [],
  inputs: [],
  engine: { version: '', kernels: 'plain' },
});

test('a signal passes, a glitch fails, a peak of noise tells nothing', () => {
  const match = card('match', ['data'], {
    numbers: [{ id: 'expected-loudest', label: '', value: 4.8, unit: '' }],
  });
  const check = card('check', ['match'], {
    tables: [
      table([
        ['1400000168.4', 11.5, 0.97, 0.52, 11.5, 0.24],
        ['1400000097.3', 9.5, 13.6, 3.8e-68, 2.9, 1e-9],
        ['1400000010.7', 4.84, 0.56, 0.97, 4.84, 0.5],
      ]),
    ],
  });
  const lines = vettingText(result([match, check]))
    .trim()
    .split('\n');
  expect(lines).toHaveLength(5);
  expect(lines[2]).toMatch(/check\s+1400000168\.4\s+11\.5\s.*passes/);
  expect(lines[3]).toMatch(/1400000097\.3.*fails: not the shape/);
  expect(lines[4]).toMatch(/can’t tell: noise alone reaches 4\.8/);
  expect(vettingText(result([match]))).toBe('');
});
