import { makeWindow } from '../kernels/windows';
import type { WindowName } from '../kernels/windows-names';

/** Share of a bin's power from which on its loss is worth a mark. */
const SHARE = 0.01;

/**
 * Number of lowest bins (zero frequency included) that lose more than 1 % of white noise when the mean of each segment
 * is taken off before the window: |Σ w e^(−2πi kn/N)|² / (N Σ w²) of bin k. Does not depend on the segment's length.
 */
export function detrendedBins(window: WindowName): number {
  const n = 512;
  const w = makeWindow(window, n);
  const squares = w.reduce((s, v) => s + v * v, 0);
  const share = (k: number): number => {
    let re = 0;
    let im = 0;
    w.forEach((v, i) => {
      re += v * Math.cos((2 * Math.PI * k * i) / n);
      im += v * Math.sin((2 * Math.PI * k * i) / n);
    });
    return (re * re + im * im) / (n * squares);
  };
  let count = 0;
  while (count < 16 && share(count) > SHARE) count++;
  return count;
}
