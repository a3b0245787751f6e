import type { Figure } from '../../src/core/figures/figure';
import { isWhole, outOf, valueRange, type Range, type View } from './ranges';

/** The view after the user has dragged in the plot; undefined when the change is none of ours. */
export function viewAfter(
  figure: Figure,
  view: View,
  change: Readonly<Record<string, unknown>>,
): View | undefined {
  const read = (name: 'xaxis' | 'yaxis'): Range | undefined => {
    const pair = change[`${name}.range`] as [number, number] | undefined;
    const a = Number(pair?.[0] ?? change[`${name}.range[0]`]);
    const b = Number(pair?.[1] ?? change[`${name}.range[1]`]);
    return Number.isFinite(a) && Number.isFinite(b) ? [a, b] : undefined;
  };
  const x = read('xaxis');
  const y = read('yaxis');
  if (!x && !y) return undefined;
  const xRange = x ? outOf(x, figure.x) : view.x;
  const moved: Range = xRange ?? figure.x.extent;
  const yRange = y ? outOf(y, figure.y) : view.y;
  const fitted =
    yRange && sameRange(yRange, valueRange(figure, view.x ?? figure.x.extent)) ? undefined : yRange;
  return {
    ...(xRange && !isWhole(moved, figure.x) ? { x: moved } : {}),
    ...(fitted ? { y: fitted } : {}),
  };
}

function sameRange(a: Range, b: Range): boolean {
  const slack = 1e-6 * Math.abs(b[1] - b[0]);
  return Math.abs(a[0] - b[0]) <= slack && Math.abs(a[1] - b[1]) <= slack;
}
