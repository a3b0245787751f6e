import { describe, expect, it } from 'vitest';
import { formatGps } from '../../src/core/data/gps-time';
import { factsFrom, type Clue } from '../../src/core/formats/facts';
import { readInstant } from '../../src/core/formats/instant';
import { meaningOf, wordsOf } from '../../src/core/formats/meaning';

describe('words of a name', () => {
  it.each([
    ['Xspacing', ['x', 'spacing']],
    ['sampleRate', ['sample', 'rate']],
    ['samplerate', ['sample', 'rate']],
    ['SAMPLING_FREQUENCY', ['sampling', 'frequency']],
    ['GPSstart', ['gps', 'start']],
    ['deltaT', ['deltat']],
    ['delta_t', ['delta', 't']],
    ['dt (ms)', ['dt', 'ms']],
    ['interval µs', ['interval', 'us']],
    ['fooBarRate', ['foo', 'bar', 'rate']],
  ])('%s', (name, words) => {
    expect(wordsOf(name)).toEqual(words);
  });
});

describe('meaning of a name', () => {
  it.each([
    ['fs', 'rate'],
    ['Sampling Rate (Hz)', 'rate'],
    ['sample_frequency', 'rate'],
    ['rate_kHz', 'rate'],
    ['Xspacing', 'spacing'],
    ['dt', 'spacing'],
    ['time-step', 'spacing'],
    ['sampling interval [ms]', 'spacing'],
    ['dx', 'spacing'],
    ['Xstart', 'start'],
    ['t0', 'start'],
    ['start_time', 'start'],
    ['gpsStartSeconds', 'start'],
    ['epoch', 'start'],
    ['gps_start_ns', 'start-nanos'],
    ['Yunits', 'unit'],
    ['units', 'unit'],
    ['Xunits', 'time-unit'],
    ['Xlabel', 'time-label'],
    ['duration', 'duration'],
    ['Npoints', 'count'],
    ['end_time', 'end'],
    ['time', 'time-axis'],
    ['GPS time', 'time-axis'],
    ['t (s)', 'time-axis'],
    ['gain', 'scale'],
  ])('%s is a %s', (name, meaning) => {
    expect(meaningOf(name)?.meaning).toBe(meaning);
  });

  it.each([
    'low_frequency',
    'event_rate',
    'cutoff frequency',
    'frequency_step',
    'UTCoffset',
    'width',
    'strain',
    'x9',
    'start_frequency',
    'time_of_merger',
    'Detector',
    'step_count_max',
  ])('%s means nothing here', (name) => {
    expect(meaningOf(name)).toBeUndefined();
  });

  it('carries the factor to Hz or seconds', () => {
    expect(meaningOf('rate_kHz')?.factor).toBe(1e3);
    expect(meaningOf('dt_us')?.factor).toBe(1e-6);
  });
});

describe('times', () => {
  const gps = (r: ReturnType<typeof readInstant>): string =>
    'time' in r ? formatGps(r.time) : JSON.stringify(r);
  it.each([
    [1400000000, '1400000000', 'GPS seconds by its magnitude'],
    [1400000000n, '1400000000', 'GPS seconds'],
    ['1400000000.123456789', '1400000000.123456789', 'GPS seconds'],
    [1400000000123456789n, '1400000000.123456789', 'GPS nanoseconds'],
    [1.400000000125e12, '1400000000.125', 'GPS milliseconds'],
    // 1716051182 − 315964800 + 18: GPS epoch in Unix seconds, 18 leap seconds (IERS Bulletin C; COMPUTED).
    [1716051182.25, '1400086400.25', 'Unix seconds by its magnitude'],
    ['2024-05-18T16:53:02.25Z', '1400086400.25', 'UTC text'],
    ['2024-05-18 16:53:02.25', '1400086400.25', 'no zone written, read as UTC'],
    ['2024-05-18T18:53:02.25+02:00', '1400086400.25', 'UTC text'],
    ['20240518T165302Z', '1400086400', 'UTC text'],
    // The leap second at the end of 2016 (IERS Bulletin C 52; READ).
    ['2016-12-31T23:59:60Z', '1167264017', 'UTC text'],
    ['2017-01-01', '1167264018', 'read as UTC'],
  ])('%s', (value, text, how) => {
    const read = readInstant(value);
    expect(gps(read)).toBe(text);
    expect('how' in read && read.how).toContain(how);
  });

  it('believes the words before the magnitude', () => {
    expect(gps(readInstant(1200000000, 'unix'))).toBe('884035214'); // 10 January 2008 21:20 UTC, 14 leap seconds
    expect(gps(readInstant(1716051182, 'gps'))).toBe('1716051182');
  });

  it('calls small numbers relative and other text no time', () => {
    expect(readInstant(0)).toEqual({ relative: true, value: 0 });
    expect(readInstant('12.5')).toEqual({ relative: true, value: 12.5 });
    expect(readInstant('noon')).toHaveProperty('rejected');
    expect(readInstant('2024-13-01')).toHaveProperty('rejected');
    expect(readInstant(NaN)).toHaveProperty('rejected');
  });
});

describe('facts of a channel', () => {
  const clue = (name: string, value: Clue['value'], distance = 0): Clue => ({
    name,
    value,
    distance,
    where: `attribute ${name}`,
  });
  const channel = { name: 'x', length: 4096 };

  it('takes the nearest clear clue', () => {
    const f = factsFrom([clue('frequency', 100), clue('sample_rate', 4096, 1), clue('fs', 512, 3)], channel);
    expect(f.rate?.value).toBe(4096);
    expect(f.notes.filter((n) => n.startsWith('Sample rates disagree'))).toHaveLength(2);
  });

  it('finds rate and spacing that agree without a word', () => {
    expect(factsFrom([clue('rate', 4096), clue('spacing', 1 / 4096)], channel)).toEqual({
      rate: { value: 4096, where: 'attribute rate' },
      notes: [],
    });
  });

  it('notes a spacing that was rounded', () => {
    const f = factsFrom([clue('dt', 0.00024414)], channel);
    expect(f.rate!.value).toBeCloseTo(4096.0105, 3);
    expect(f.notes[0]).toContain('nearly 4096 Hz');
  });

  it('reads numbers with units, text and one entry per axis', () => {
    expect(factsFrom([clue('dt', '0.25 ms')], channel).rate?.value).toBe(4000);
    expect(factsFrom([clue('rate', '16 kHz')], channel).rate?.value).toBe(16000);
    expect(factsFrom([clue('spacing', [1, 0.5])], { ...channel, axis: 1 }).rate?.value).toBe(2);
  });

  it('ignores values that cannot be, and says so', () => {
    const f = factsFrom([clue('fs', -1), clue('dt', 0), clue('t0', 'soon')], channel);
    expect(f.rate).toBeUndefined();
    expect(f.start).toBeUndefined();
    expect(f.notes).toHaveLength(3);
  });

  it('does not take a relative start for a time', () => {
    const f = factsFrom([clue('t0', 0), clue('fs', 4096)], channel);
    expect(f.start).toBeUndefined();
    expect(f.notes[0]).toContain('since something the file does not name');
  });

  it('lets a label decide between GPS and Unix', () => {
    const clues = [clue('start', 1600000000), clue('Xlabel', 'GPS time')];
    expect(formatGps(factsFrom(clues, channel).start!.value)).toBe('1600000000');
  });

  it('compares length, duration and end', () => {
    const f = factsFrom(
      [
        clue('fs', 1024),
        clue('start', 1400000000),
        clue('duration', 5),
        clue('npoints', 4000),
        clue('end', 1400000007),
      ],
      channel,
    );
    expect(f.notes).toEqual([
      'attribute duration says 5 s, but 4096 samples at 1024 Hz are 4 s.',
      'attribute npoints says 4000 samples, but there are 4096.',
      'attribute end is 7 s after the start, but the samples last 4 s.',
    ]);
  });

  it('says that a scale is not applied', () => {
    expect(factsFrom([clue('gain', 2.5)], channel).notes[0]).toContain('not applied');
    expect(factsFrom([clue('gain', 1)], channel).notes).toEqual([]);
  });
});
