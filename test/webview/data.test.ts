import { describe, expect, it } from 'vitest';
import { gpsTime } from '../../src/core/data/gps-time';
import { channelFacts, channelLine, type ChannelFacts } from '../../webview/data/channel-words';

const channel: ChannelFacts = {
  name: '/strain',
  type: 'float64',
  shape: [40960],
  length: 40960,
  rate: { value: 4096, where: 'attribute spacing of /strain' },
  start: { value: gpsTime(1400000000), where: 'attribute start of /strain' },
  unit: { value: 'strain', where: 'attribute unit of /strain' },
  runs: [
    { from: 0, to: 8192 },
    { from: 12288, to: 40960 },
  ],
  notes: [],
};
const bare: ChannelFacts = { name: 'column 1', type: 'text', shape: [40960], length: 40960, notes: [] };
const value = (c: ChannelFacts, name: string, said?: { rate: number }): string | undefined =>
  channelFacts(c, said).find((f) => f.name === name)?.value;

describe('channel facts', () => {
  it('say rate, start in both scales, length, end and gaps, each with where it was found', () => {
    expect(channelLine(channel)).toBe('40\u202f960 float64 at 4096 Hz');
    expect(value(channel, 'start')).toBe('GPS 1400000000, 2024-05-17T16:53:02Z');
    expect(value(channel, 'end')).toBe('GPS 1400000010, 2024-05-17T16:53:12Z');
    expect(value(channel, 'length')).toBe('10 s');
    expect(value(channel, 'gaps')).toBe('1 (4096 samples missing, 1 s)');
    expect(channelFacts(channel).find((f) => f.name === 'rate')?.where).toBe('attribute spacing of /strain');
  });
  it('say plainly what the file does not, and whose word the rate is', () => {
    expect(channelLine(bare)).toBe('40\u202f960 text, rate not said');
    expect(value(bare, 'rate')).toBe('not said in the file');
    expect(value(bare, 'length')).toBeUndefined();
    expect(channelFacts(bare, { rate: 4096 }).find((f) => f.name === 'rate')).toEqual({
      name: 'rate',
      value: '4096 Hz',
      where: 'your answer',
    });
    expect(value(bare, 'length', { rate: 4096 })).toBe('10 s');
  });
});
