import { expect, test } from 'vitest';
import type { StepDescription } from '../../src/core/protocol/engine';
import { steps } from '../../src/core/steps';
import { nextSteps, spanSteps } from '../../webview/look/next-steps';

const described = Object.values(steps).map((s): StepDescription => ({ ...s, params: s.params }));
const names = [
  { name: 'alder', kind: 'series' },
  { name: 'clean', kind: 'series' },
  { name: 'found', kind: 'lines' },
  { name: 'map', kind: 'map' },
];

test('lines go on to a notch of the data they were found in, not of the newest', () => {
  const offers = nextSteps({ id: 'found', of: ['alder'] }, names, described);
  expect(offers.find((o) => o.step.do === 'notch')?.step).toEqual({ do: 'notch', of: ['alder', 'found'] });
  expect(nextSteps({ id: 'clean', of: ['alder'] }, names, described)).toEqual([]);
});

const axis = {
  label: '',
  unit: 's',
  scale: 'linear',
  link: 'time',
  epoch: '1400000000.5',
  extent: [0, 256],
} as const;
const known = new Set(described.map((s) => s.id));

test('a stretch of time becomes GPS spans that keep their digits', () => {
  const offers = spanSteps({ id: 'clean', of: ['alder'] }, axis, [96.25, 98.5], names, known);
  const of = (id: string) => offers.filter((o) => o.step.do === id).map((o) => o.step);
  expect(of('constant-q-map')[0]).toEqual({
    do: 'constant-q-map',
    of: ['clean'],
    params: { start: '1400000096.75', duration: 2.25 },
  });
  expect(of('gate')[0].params).toEqual({ 'gps-spans': [1400000096.75, 1400000099] });
  expect(of('noise-spectrum').map((s) => s.params?.['exclude'])).toEqual([
    [96.25, 98.5],
    [0, 96.25, 98.5, 256],
  ]);
  // Every offer's parameters are known to its step.
  for (const { step } of offers)
    for (const key of Object.keys(step.params ?? {}))
      expect(Object.keys(steps[step.do].params)).toContain(key);
});

test('figures that are not of time, or of no series, offer nothing', () => {
  expect(spanSteps({ id: 'clean', of: [] }, { ...axis, link: 'frequency' }, [1, 2], names, known)).toEqual(
    [],
  );
  expect(spanSteps({ id: 'found', of: [] }, axis, [1, 2], names, known)).toEqual([]);
  expect(spanSteps({ id: 'map', of: ['alder'] }, axis, [1, 2], names, known).map((o) => o.step.do)).toEqual([
    'constant-q-map',
    'spectrogram',
    'gate',
  ]);
});
