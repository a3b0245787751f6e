import { basename, dirname, resolve } from 'node:path';
import { UserError } from '../../core/data/errors';
import { addSamples, formatGps, utcText } from '../../core/data/gps-time';
import type { ChannelFacts } from '../../core/formats/format';
import { startingRecipe } from '../../core/recipe/starting-recipe';
import { onlyWord } from './args';
import type { Command } from './cli';
import { columns, number } from './format';
import { runRecipe } from './recipe-file';
import { resultText } from './result-text';
import { EXIT, quiet } from './world';

const USAGE = 'overview FILE [--channel NAME] [--rate HZ] [--json]';

/** `fringeside overview`: what is in a data file, and a first look at one channel. */
export const overview: Command = {
  name: 'overview',
  usage: USAGE,
  help: 'tells what is in a data file and looks at one channel\nWithout --channel the likeliest one is taken and named.',
  options: [
    { name: 'channel', value: 'NAME', help: 'the channel to look at' },
    { name: 'rate', value: 'HZ', help: 'sample rate, when the file does not say it' },
    { name: 'json', help: 'print facts of the file as JSON, without the look' },
  ],
  async run(args, world) {
    const word = onlyWord(args, USAGE);
    const file = resolve(world.cwd, word);
    const engine = await world.engine();
    const facts = await engine.describe({ file }, quiet(world));
    if (args.options.has('json')) {
      world.out(`${JSON.stringify(facts, null, 2)}\n`);
      return EXIT.ok;
    }
    world.out(
      `${word}: ${facts.format}, ${facts.size} bytes, ${facts.channels.length} channel${facts.channels.length === 1 ? '' : 's'}\n`,
    );
    world.out(
      columns(
        facts.channels.map((c) => channelRow(c)),
        [],
        '  ',
      ),
    );
    const wanted = args.options.get('channel');
    const channel = wanted === undefined ? facts.channels[0] : facts.channels.find((c) => c.name === wanted);
    if (!channel)
      throw new UserError(
        'no-channel',
        `${word} has no channel ${wanted === undefined ? 'that can be read as a series' : `"${wanted}"`}`,
      );
    const rate = args.options.get('rate');
    const spec = startingRecipe(basename(file), channel, rate === undefined ? {} : { rate: Number(rate) });
    const recipe = { text: spec, folder: dirname(file), path: word };
    const result = await runRecipe(recipe, world);
    world.out(`\n${resultText(result, world.columns)}`);
    return result.cards.every((c) => c.state === 'done') ? EXIT.ok : EXIT.failed;
  },
};

function channelRow(c: ChannelFacts): string[] {
  const rate = c.rate ? `${number(c.rate.value)} Hz (${c.rate.where})` : 'rate not found: give --rate';
  const start = c.start
    ? `from GPS ${formatGps(c.start.value)} = ${utcText(c.start.value)} (${c.start.where})`
    : 'start not found';
  const end =
    c.start && c.rate ? ` to GPS ${formatGps(addSamples(c.start.value, c.length, c.rate.value))}` : '';
  const gaps = c.runs && c.runs.length > 1 ? `${c.runs.length - 1} gaps` : '';
  return [
    c.name,
    c.type,
    c.shape.join(' × '),
    rate,
    start + end,
    c.unit ? `${c.unit.value} (${c.unit.where})` : 'unit not found',
    gaps,
    ...c.notes,
  ];
}
