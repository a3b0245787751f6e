import { join, resolve } from 'node:path';
import { writeDemo } from '../demo-files';
import { onlyWord } from './args';
import type { Command } from './cli';
import { run } from './run';
import { EXIT } from './world';

const USAGE = 'demo DIR [--run]';

/** `fringeside demo`: two invented sites' data with a planted signal, glitch, gap and lines, and a recipe for them. */
export const demo: Command = {
  name: 'demo',
  usage: USAGE,
  help: 'writes the demo data of two invented sites and their recipe\nThe data are made up from a fixed seed and are the same on every machine.',
  options: [{ name: 'run', help: 'also run the recipe and write DIR/results/report.html' }],
  async run(args, world) {
    const dir = onlyWord(args, USAGE);
    const files = await writeDemo(resolve(world.cwd, dir));
    for (const f of files) world.err(`${f.written ? 'wrote' : 'kept'} ${join(dir, f.name)}\n`);
    if (!args.options.has('run')) return EXIT.ok;
    const recipe = join(dir, 'demo.fringe.json');
    const results = join(dir, 'results');
    const code = await run.run({ words: [recipe], options: new Map([['out', results]]) }, world);
    world.out(
      `\nOpen ${join(results, 'report.html')} in a browser, or the same recipe in the editor: code ${recipe}\n`,
    );
    return code;
  },
};
