/**
 * What a name in a file means, whatever the layout: "Xspacing", "sample_rate", "deltaT", "GPSstart" and the like are
 * taken apart into words, and the words decide. A name with a word that does not belong to the meaning has none:
 * "low_frequency" is not a sample rate.
 */
export type Meaning =
  | 'rate'
  | 'spacing'
  | 'start'
  | 'start-nanos'
  | 'end'
  | 'duration'
  | 'count'
  | 'unit'
  | 'label'
  | 'scale'
  | 'time-unit'
  | 'time-label'
  | 'time-axis';

export type TimeScale = 'gps' | 'unix' | 'utc';

export interface NameMeaning {
  readonly meaning: Meaning;
  /** Multiplies the value to Hz or seconds: "dt_ms" has 1e-3. */
  readonly factor: number;
  /** Time scale the name itself states. */
  readonly scale?: TimeScale;
  /** 3 plain, 2 usual, 1 only when nothing better is found. */
  readonly sure: 1 | 2 | 3;
}

const CLASSES = {
  sample: 'sample samples sampling sampled samp',
  rate: 'rate frequency freq fs srate',
  spacing: 'spacing step interval dt delta deltat dx increment period',
  start: 'start origin epoch begin beginning t0 x0',
  end: 'end stop t1',
  time: 'time times t x timestamp timestamps stamp stamps',
  value: 'y value values data series channel signal strain axis h amplitude record trace',
  gps: 'gps',
  unix: 'unix posix',
  utc: 'utc iso date datetime',
  second: 's sec secs second seconds',
  milli: 'ms msec millisecond milliseconds',
  micro: 'us usec microsecond microseconds',
  nano: 'ns nsec nano nanos nanosecond nanoseconds',
  hertz: 'hz hertz',
  kilohertz: 'khz kilohertz',
  megahertz: 'mhz megahertz',
  unit: 'unit units',
  label: 'label quantity',
  scale: 'scale gain calibration factor',
  duration: 'duration',
  count: 'npoints nsamples npts length count num number n points',
  filler: 'of in the nominal',
} as const;

type WordClass = keyof typeof CLASSES;

const VOCABULARY = new Map<string, WordClass>(
  Object.entries(CLASSES).flatMap(([cls, words]) =>
    words.split(' ').map((w) => [w, cls as WordClass] as const),
  ),
);

/** Words of a name in lower case; glued words are taken apart where the vocabulary allows it. */
export function wordsOf(name: string): string[] {
  const clean = name.replace(/[µμ](?=s)/g, 'u');
  return clean.split(/[^A-Za-z0-9]+/).flatMap((piece) => (piece === '' ? [] : splitPiece(piece)));
}

function splitPiece(piece: string): string[] {
  const low = piece.toLowerCase();
  const glued = segment(low) ?? axisAndRest(low);
  if (glued) return glued;
  const parts = piece.match(/[A-Z]+(?![a-z])|[A-Z]?[a-z]+|\d+/g) ?? [piece];
  if (parts.length < 2) return [low];
  return parts.flatMap((p) => segment(p.toLowerCase()) ?? [p.toLowerCase()]);
}

/** "xspacing": the letter of the axis, then known words. */
function axisAndRest(low: string): string[] | undefined {
  const axis = low[0];
  if (axis !== 'x' && axis !== 'y' && axis !== 't') return undefined;
  const rest = segment(low.slice(1));
  return rest ? [axis, ...rest] : undefined;
}

/** Splits into known words of at least two letters, fewest words first; undefined when that leaves a rest. */
function segment(text: string): string[] | undefined {
  if (VOCABULARY.has(text)) return [text];
  for (let n = text.length - 2; n >= 2; n--) {
    const head = text.slice(0, n);
    if (!VOCABULARY.has(head)) continue;
    const rest = segment(text.slice(n));
    if (rest && (rest[0] ?? '').length > 1) return [head, ...rest];
  }
  return undefined;
}

/** Meaning of a name, or undefined when the words do not add up to one. */
export function meaningOf(name: string): NameMeaning | undefined {
  const words = wordsOf(name);
  const found = new Set<WordClass>();
  for (const w of words) {
    const cls = VOCABULARY.get(w);
    if (cls === undefined) return undefined;
    found.add(cls);
  }
  const only = (...allowed: WordClass[]): boolean =>
    [...found].every((c) => c === 'filler' || c === 'value' || allowed.includes(c));
  const has = (c: WordClass): boolean => found.has(c);
  const scale: TimeScale | undefined = has('gps')
    ? 'gps'
    : has('unix')
      ? 'unix'
      : has('utc')
        ? 'utc'
        : undefined;
  const stated = scale === undefined ? {} : { scale };
  const seconds = has('milli') ? 1e-3 : has('micro') ? 1e-6 : has('nano') ? 1e-9 : 1;

  if ((has('rate') || has('hertz') || has('kilohertz') || has('megahertz')) && !has('spacing')) {
    if (!only('rate', 'sample', 'hertz', 'kilohertz', 'megahertz')) return undefined;
    const factor = has('kilohertz') ? 1e3 : has('megahertz') ? 1e6 : 1;
    const bare = words.length === 1 && /^freq/.test(words[0]);
    return { meaning: 'rate', factor, sure: has('sample') || words.includes('fs') ? 3 : bare ? 1 : 2 };
  }
  if (has('spacing')) {
    if (!only('spacing', 'sample', 'time', 'second', 'milli', 'micro', 'nano')) return undefined;
    const plain = has('sample') || has('time') || words.includes('dt') || words.includes('deltat');
    const weak = words.length === 1 && (words[0] === 'period' || words[0] === 'step');
    return { meaning: 'spacing', factor: seconds, sure: plain ? 3 : weak ? 1 : 2 };
  }
  if (has('unit') && only('unit', 'time')) {
    const time = has('time');
    return { meaning: time ? 'time-unit' : 'unit', factor: 1, sure: 3 };
  }
  if (has('label') && only('label', 'time')) {
    return { meaning: has('time') ? 'time-label' : 'label', factor: 1, sure: 2 };
  }
  if (has('start') && only('start', 'time', 'gps', 'unix', 'utc', 'second', 'milli', 'micro', 'nano')) {
    if (has('nano')) return { meaning: 'start-nanos', factor: 1e-9, sure: 2, ...stated };
    return { meaning: 'start', factor: seconds, sure: has('time') || scale ? 3 : 2, ...stated };
  }
  if (has('end') && only('end', 'time', 'gps', 'unix', 'utc', 'second')) {
    return { meaning: 'end', factor: 1, sure: 2, ...stated };
  }
  if (has('duration') && only('duration', 'time', 'second', 'milli')) {
    return { meaning: 'duration', factor: seconds, sure: 3 };
  }
  if (has('count') && only('count', 'sample')) {
    const plain = has('sample') || words.some((w) => /^(n?points|npts|nsamples)$/.test(w));
    return { meaning: 'count', factor: 1, sure: plain ? 3 : 1 };
  }
  if (has('scale') && only('scale', 'unit')) return { meaning: 'scale', factor: 1, sure: 2 };
  const timeWord = has('time') || has('second') || scale !== undefined;
  if (timeWord && only('time', 'sample', 'gps', 'unix', 'utc', 'second', 'milli', 'micro', 'nano')) {
    if (has('nano') && scale !== undefined && !has('time')) {
      return { meaning: 'start-nanos', factor: 1e-9, sure: 1, ...stated };
    }
    return { meaning: 'time-axis', factor: seconds, sure: has('time') || scale ? 2 : 1, ...stated };
  }
  return undefined;
}
