import { incompleteGammaInverse } from '../kernels/special-incomplete-gamma';

/** Value below which a chi-square variable with `freedom` degrees of freedom (any positive number) lies with probability `p`. */
export function chiSquareQuantile(p: number, freedom: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`the probability must be between 0 and 1, not ${p}`);
  return 2 * incompleteGammaInverse(freedom / 2, p, 'lower');
}
