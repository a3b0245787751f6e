import { WINDOW_NAMES } from '../kernels/windows-names';
import type { ParamSpecs } from '../steps/define';

/** Parameters of the noise spectrum. */
export const SPECTRUM_PARAMS = {
  segment: {
    kind: 'number',
    label: 'Segment',
    unit: 's',
    default: 4,
    min: 0,
    exclusiveMin: true,
    slider: 'log',
    help: 'Length of the pieces that are averaged. It sets the resolution: the bins are 1/segment apart and a Hann window resolves 1.5/segment. Take longer segments to separate narrow lines (16 or 64 s), shorter ones when the span is short: fewer than 8 segments say little about the noise.',
  },
  overlap: {
    kind: 'number',
    label: 'Overlap',
    unit: '',
    default: 0.5,
    min: 0,
    max: 0.95,
    help: 'Fraction of a segment shared with the next. 0.5 uses the data a Hann window would otherwise suppress at the edges; flat-top and other wide windows gain from 0.7 or more; a boxcar window wants 0. More overlap than that costs time and adds no information.',
  },
  window: {
    kind: 'choice',
    label: 'Window',
    choices: WINDOW_NAMES,
    default: 'hann',
    help: 'Taper of each segment. Hann suits noise. Where the density falls by more than about ten decades, or close beside strong lines, take blackman-harris or nuttall. To read the height of a line take flat-top or one of the HFT windows. Boxcar and tukey leak over a steep low-frequency wall.',
  },
  average: {
    kind: 'choice',
    label: 'Average',
    choices: ['mean', 'median', 'median-mean'],
    default: 'median',
    help: 'How the segments are combined. The median (divided by its bias in Gaussian noise) is not moved by a transient or by the signal itself. The mean has the smaller error (by 1.44) and keeps the power exactly; take it for steady noise, and to measure lines: the power of a steady line comes out up to 1.44 times too large in a median. Median-mean is the mean of the medians of even and odd segments.',
  },
  detrend: {
    kind: 'choice',
    label: 'Detrend',
    choices: ['constant', 'none'],
    default: 'constant',
    help: 'Takes the mean off each segment before the window, which empties the lowest bins (they are marked). Take none only when the mean itself is of interest.',
  },
  low: {
    kind: 'number',
    label: 'Floor from',
    unit: 'Hz',
    default: null,
    min: 0,
    help: 'Lower edge of the band in which the floor is read off. Left empty: 100 Hz, or a quarter of the sample rate’s half when that is too low. It changes the numbers only, not the spectrum.',
  },
  high: {
    kind: 'number',
    label: 'Floor to',
    unit: 'Hz',
    default: null,
    min: 0,
    exclusiveMin: true,
    help: 'Upper edge of the band in which the floor is read off. Left empty: 200 Hz, or half of the sample rate’s half when that is too low.',
  },
  exclude: {
    kind: 'list',
    label: 'Leave out',
    unit: 's',
    each: 2,
    default: [],
    help: 'Spans that must not enter, as pairs of seconds after the start of the input: the time of a candidate, so that a signal is not counted as noise against itself, or a loud transient. With the median a short signal matters little; with the mean always leave it out.',
  },
} as const satisfies ParamSpecs;
