import { expect, test } from 'vitest';
import type { Figure } from '../../src/core/figures/figure';
import { figureSvg } from '../../src/core/figures/svg/figure-svg';

const figure = (change: Partial<Figure> = {}): Figure => ({
  id: 'f',
  title: 'A title',
  caption: 'What is seen.',
  x: { label: 'Frequency', unit: 'Hz', scale: 'log', extent: [10, 1000] },
  y: { label: 'Density', unit: 'strain/√Hz', scale: 'log', range: [1e-24, 1e-20], extent: [1e-24, 1e-20] },
  traces: [
    {
      type: 'line',
      name: 'noise',
      role: 'data',
      x: Float64Array.of(10, 100, 200, 500, 1000),
      y: Float64Array.of(1e-20, 1e-22, NaN, 1e-23, 1e-24),
    },
  ],
  marks: [{ role: 'gap', from: 20, to: 30, label: 'gap' }],
  ...change,
});
const size = { width: 900, height: 420, style: 'print' } as const;

test('values stand where the axes say, and a missing value breaks the line', () => {
  const svg = figureSvg(figure(), size);
  // Two decades from 84 to 884: 100 Hz is in the middle. The value axis has four decades.
  const path = /<path d="(M[^"]*)" fill="none" stroke="#/.exec(svg)![1];
  const runs = path.split('M').filter(Boolean);
  expect(runs).toHaveLength(2);
  const [first, second] = runs[0].split('L').map((p) => p.split(' ').map(Number));
  expect(first[0]).toBe(84);
  expect(second[0]).toBe(484);
  const end = Number(runs[1].split('L')[1].split(' ')[1]);
  expect(second[1] - first[1]).toBeCloseTo((end - first[1]) / 2, 1);
  expect(svg).toContain('>10⁻²²<');
  expect(svg).not.toMatch(/NaN|Infinity|undefined/);
});

test('the same figure gives the same text in every style, and hostile names stay text', () => {
  const hostile = figure({ title: '</svg><script>alert(1)</script>', caption: `"'&<>` });
  for (const style of ['print', 'light', 'dark'] as const) {
    const svg = figureSvg(hostile, { ...size, style });
    expect(figureSvg(hostile, { ...size, style })).toBe(svg);
    expect(svg).not.toContain('<script');
    expect(svg.match(/<\/svg>/g)).toHaveLength(1);
    expect(svg).toContain('&lt;script&gt;');
  }
});

test('bars, ranges and empty axes are drawn without a wrong coordinate', () => {
  const svg = figureSvg(
    figure({
      x: { label: 'v', unit: '', scale: 'linear', extent: [0, 0] },
      y: { label: 'n', unit: '', scale: 'log', extent: [0, 0] },
      traces: [
        {
          type: 'bars',
          name: 'b',
          role: 'data',
          edges: Float64Array.of(-1, 0, 1),
          counts: Float64Array.of(0, 5),
        },
        {
          type: 'range',
          name: 'r',
          role: 'interval',
          x: Float64Array.of(0, 1),
          low: Float64Array.of(1, 1),
          high: Float64Array.of(2, NaN),
        },
      ],
    }),
    { ...size, bare: true },
  );
  expect(svg).not.toMatch(/NaN|Infinity|undefined/);
  expect(svg).toMatch(/<path d="M[^"]*Z" fill="rgba/);
});
