import type { Source } from '../steps/define';

/** Where the filters come from, for every step that uses them. */
export const FILTER_SOURCES: readonly Source[] = [
  {
    text: 'Butterworth, Chebyshev and elliptic designs by the bilinear transformation: Parks & Burrus, Digital Filter Design (Wiley, 1987)',
    flag: 'memory',
  },
  {
    text: 'Filtering forwards and backwards with the start in the steady state: Gustafsson, IEEE Trans. Signal Process. 44, 988 (1996)',
    flag: 'memory',
  },
  { text: 'Second-order sections instead of one polynomial, for the digits', flag: 'common practice' },
];
