import { addSamples, formatGps, utcText } from '../../src/core/data/gps-time';
import type { FileDescription } from '../../src/core/protocol/engine';
import { numberText, secondsText } from '../../src/core/figures/shown-number';

export type ChannelFacts = FileDescription['channels'][number];

/** One line for the tree: "1 048 576 float64 at 4096 Hz". */
export function channelLine(c: ChannelFacts): string {
  const rate = c.rate ? ` at ${numberText(c.rate.value, 9)} Hz` : ', rate not said';
  return `${numberText(c.length)} ${c.type}${rate}`;
}

export interface Fact {
  readonly name: string;
  readonly value: string;
  readonly where?: string;
}

/** Everything known of a channel, with where it was found; `rate` is the user's answer when the file says none. */
export function channelFacts(
  c: ChannelFacts,
  said?: { readonly rate?: number; readonly epoch?: string },
): Fact[] {
  const rate = c.rate?.value ?? said?.rate;
  const start = c.start?.value;
  const facts: Fact[] = [
    { name: 'samples', value: `${numberText(c.length)} ${c.type}` },
    { name: 'shape', value: c.shape.map((n) => numberText(n)).join(' × ') },
    rate === undefined
      ? { name: 'rate', value: 'not said in the file' }
      : { name: 'rate', value: `${numberText(rate, 9)} Hz`, where: c.rate?.where ?? 'your answer' },
    {
      name: 'unit',
      value: c.unit?.value ?? 'not said in the file',
      ...(c.unit ? { where: c.unit.where } : {}),
    },
    start === undefined
      ? { name: 'start', value: said?.epoch === undefined ? 'not said in the file' : `GPS ${said.epoch}` }
      : { name: 'start', value: `GPS ${formatGps(start)}, ${utcText(start)}`, where: c.start?.where ?? '' },
  ];
  if (rate !== undefined) facts.push({ name: 'length', value: secondsText(c.length / rate) });
  if (rate !== undefined && start !== undefined) {
    const end = addSamples(start, c.length, rate);
    facts.push({ name: 'end', value: `GPS ${formatGps(end)}, ${utcText(end)}` });
  }
  facts.push({ name: 'gaps', value: gapsText(c, rate) });
  return facts;
}

function gapsText({ runs, length }: ChannelFacts, rate: number | undefined): string {
  if (!runs || runs.length < 2) return 'none told by the file';
  const missing = length - runs.reduce((n, r) => n + (r.to - r.from), 0);
  const time = rate === undefined ? '' : `, ${secondsText(missing / rate)}`;
  return `${runs.length - 1} (${numberText(missing)} samples missing${time})`;
}
