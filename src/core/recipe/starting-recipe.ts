import { formatGps } from '../data/gps-time';
import type { ChannelFacts } from '../formats/format';

/** Spans longer than this many samples are not looked at whole at first; the user widens the span in the card. */
const FIRST_LOOK_SAMPLES = 1 << 27;

/** Facts the user gave because the file does not say them. */
export interface SaidByUser {
  readonly rate?: number;
  readonly epoch?: string;
  readonly unit?: string;
}

/** Text of the recipe a new look begins with: one channel, an overview and a noise spectrum. */
export function startingRecipe(file: string, channel: ChannelFacts, said: SaidByUser = {}): string {
  const rate = said.rate ?? channel.rate?.value;
  const tooLong = rate !== undefined && channel.length > FIRST_LOOK_SAMPLES;
  const input = {
    file,
    channel: channel.name,
    ...(tooLong && channel.start ? { start: formatGps(channel.start.value) } : {}),
    ...(tooLong ? { duration: Math.floor(FIRST_LOOK_SAMPLES / rate) } : {}),
    ...said,
  };
  const name = inputName(file);
  const recipe = {
    fringe: 1,
    inputs: { [name]: input },
    steps: [
      { id: 'overview', do: 'overview', of: [name] },
      { id: 'noise', do: 'noise-spectrum', of: [name] },
    ],
  };
  return `${JSON.stringify(recipe, null, 2)}\n`;
}

/** A name for an input made from a file's: letters, digits, - and _. */
export function inputName(file: string): string {
  const stem = file
    .replace(/^.*[\\/]/, '')
    .replace(/\.(gz|csv|tsv|txt|npy|npz|h5|hdf5|wav|bin|raw|dat|f32|f64)$/gi, '');
  const clean = stem
    .replace(/\.[^.]*$/, '')
    .replace(/[^A-Za-z0-9_-]+/g, '-')
    .replace(/^[^A-Za-z]+|-+$/g, '');
  return clean === '' || ['overview', 'noise'].includes(clean) ? 'data' : clean;
}
