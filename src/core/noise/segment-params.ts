import { WINDOW_NAMES } from '../kernels/windows-names';
import type { ListParam, NumberParam } from '../steps/define';

/** Parameters that the steps working on segments share. */
export const OVERLAP_PARAM = {
  kind: 'number',
  label: 'Overlap',
  unit: '',
  default: 0.5,
  min: 0,
  max: 0.95,
  help: 'Fraction of a segment shared with the next. 0.5 suits a Hann window; wide windows such as nuttall or flat-top gain from 0.75. The correlation this makes between segments is accounted for.',
} as const satisfies NumberParam;

export const EXCLUDE_PARAM = {
  kind: 'list',
  label: 'Leave out',
  unit: 's',
  each: 2,
  default: [],
  help: 'Spans that must not enter, as pairs of seconds after the start of the input: a loud transient, the time of a candidate.',
} as const satisfies ListParam;

export const WINDOW_PARAM = {
  kind: 'choice',
  label: 'Window',
  choices: WINDOW_NAMES,
  default: 'hann',
  help: 'Taper of each segment. Hann suits most noise; where the density falls by more than about ten decades, or with segments of a second or less over a steep low-frequency wall, take nuttall or blackman-harris. Boxcar and tukey leak.',
} as const;

/** For steps that take the noise from the data when no spectrum is given. */
export const OWN_SEGMENT_PARAM = {
  kind: 'number',
  label: 'Segment of the own spectrum',
  unit: 's',
  default: 4,
  min: 0,
  exclusiveMin: true,
  help: 'Only without a spectrum in "of": length of the half-overlapping Hann segments whose median is taken as noise of these data.',
} as const satisfies NumberParam;
