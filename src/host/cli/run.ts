import { join, resolve } from 'node:path';
import { UserError } from '../../core/data/errors';
import { writeAtomically } from '../write-atomically';
import { reportHtml } from '../report/report';
import { resultJson } from '../result-json';
import type { Args } from './args';
import type { Command } from './cli';
import { failedCards, readRecipe, runRecipe } from './recipe-file';
import { resultText } from './result-text';
import { EXIT } from './world';

const USAGE = 'run RECIPE [--json] [--out DIR] [--workers N]';

/** Threads asked for, at most 64: more than any node has cores to spare for one recipe. */
function workersOf(args: Args): number {
  const text = args.options.get('workers') ?? '1';
  const workers = Number(text);
  if (!Number.isInteger(workers) || workers < 1 || workers > 64)
    throw new UserError('usage', `--workers must be a whole number from 1 to 64, not "${text}"`);
  return workers;
}

/** `fringeside run`: the recipe's numbers and warnings on stdout, and on request files. */
export const run: Command = {
  name: 'run',
  usage: USAGE,
  help: 'runs a recipe and prints its numbers\nA step that fails is reported and the others go on.',
  options: [
    { name: 'json', help: 'print the result as JSON instead of text' },
    { name: 'workers', value: 'N', help: 'threads to spread independent steps over (1 if not given)' },
    { name: 'out', value: 'DIR', help: 'also write result.json and report.html into DIR' },
  ],
  async run(args, world) {
    const recipe = readRecipe(args, world, USAGE);
    const result = await runRecipe(recipe, world, workersOf(args));
    const json = resultJson(recipe, result);
    world.out(args.options.has('json') ? json : resultText(result, world.columns));
    const out = args.options.get('out');
    if (out !== undefined) {
      const folder = resolve(world.cwd, out);
      for (const [name, text] of [
        ['result.json', json],
        ['report.html', reportHtml(recipe, result, world.dist)],
      ] as const) {
        writeAtomically(join(folder, name), text);
        world.err(`wrote ${join(out, name)}\n`);
      }
    }
    if (world.cancelled()) return EXIT.interrupted;
    if (result.cards.length === 0) return EXIT.user;
    return failedCards(result).length > 0 ? EXIT.failed : EXIT.ok;
  },
};
