import type { Figure } from '../../src/core/figures/figure';
import { isWhole, panned, valueRange, zoomed, type Range, type View } from './ranges';

const STEP = 0.15;
const ZOOM = 0.6;

/** The view after a key was pressed on a figure; undefined for keys that mean nothing there. */
export function keyAction(key: string, figure: Figure, view: View): View | undefined {
  const x = view.x ?? figure.x.extent;
  const y = view.y ?? valueRange(figure, x);
  const withX = (range: Range): View => ({
    ...(isWhole(range, figure.x) ? {} : { x: range }),
    ...(view.y ? { y: view.y } : {}),
  });
  const withY = (range: Range): View => ({ ...(view.x ? { x: view.x } : {}), y: range });
  // Values may be looked at beyond the extent of the data, so vertical moves are not held back.
  const free = {
    ...figure.y,
    extent: figure.y.scale === 'log' ? ([1e-300, 1e300] as const) : ([-1e300, 1e300] as const),
  };
  switch (key) {
    case 'ArrowLeft':
      return withX(panned(x, -STEP, figure.x));
    case 'ArrowRight':
      return withX(panned(x, STEP, figure.x));
    case 'ArrowUp':
      return withY(panned(y, STEP, free));
    case 'ArrowDown':
      return withY(panned(y, -STEP, free));
    case '+':
    case '=':
      return withX(zoomed(x, ZOOM, figure.x));
    case '-':
    case '_':
      return withX(zoomed(x, 1 / ZOOM, figure.x));
    case '0':
      return {};
    default:
      return undefined;
  }
}
