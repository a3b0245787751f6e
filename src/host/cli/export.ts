import { dirname, relative, resolve, sep } from 'node:path';
import { UserError } from '../../core/data/errors';
import { hint, nearestNames } from '../../core/data/nearest';
import { parseRecipe } from '../../core/recipe/parse';
import { writeAtomically } from '../write-atomically';
import type { Command } from './cli';
import { diagnosticLine, readRecipe } from './recipe-file';
import { EXIT } from './world';

const USAGE = 'export RECIPE [--out FILE] [--step ID]';

/** `fringeside export`: a script in Python that computes a recipe's numbers again and compares. */
export const exportCommand: Command = {
  name: 'export',
  usage: USAGE,
  help:
    'writes a recipe as one Python script\nThe script needs NumPy and SciPy (h5py for HDF5), checks that the data are the same, computes every step and compares\n' +
    'with the numbers of this run: its exit code is 0 when all agree. It is printed, or written to FILE. The folder of the\n' +
    'data can be given to the script as its argument.',
  options: [
    { name: 'out', value: 'FILE', help: 'write the script to FILE instead of printing it' },
    { name: 'step', value: 'ID', help: 'only this step of the recipe and what it depends on' },
  ],
  async run(args, world) {
    const recipe = readRecipe(args, world, USAGE);
    const out = args.options.get('out');
    const only = args.options.get('step');
    const ids = parseRecipe(recipe.text).recipe?.steps.map((s) => s.id);
    if (only !== undefined && ids && !ids.includes(only))
      throw new UserError(
        'unknown-step',
        `the recipe has no step "${only}".${hint(nearestNames(only, ids)) || ` It has: ${ids.join(', ')}.`}`,
      );
    const target = out === undefined ? undefined : resolve(world.cwd, out);
    // So that a slip of the hand never writes over data or the recipe.
    if (out !== undefined && !out.endsWith('.py'))
      throw new UserError('usage', `--out names the script, and "${out}" does not end in .py`, target);
    const dataFolder =
      target === undefined ? '.' : relative(dirname(target), recipe.folder).split(sep).join('/') || '.';
    const engine = await world.engine();
    const made = await engine.exportPython(
      { ...recipe, dataFolder, ...(only === undefined ? {} : { only: [only] }) },
      { event: () => undefined, cancelled: () => world.cancelled() },
    );
    for (const d of made.diagnostics) world.err(diagnosticLine(recipe.path, d));
    for (const l of made.leftOut) world.err(`left out: step "${l.id}" (${l.do}): ${l.why}\n`);
    if (world.cancelled()) return EXIT.interrupted;
    if (made.script === undefined) {
      world.err('fringeside: there is no step that can be written in Python, so there is no script\n');
      return EXIT.user;
    }
    if (target === undefined) world.out(made.script);
    else {
      writeAtomically(target, made.script);
      world.err(`wrote ${out}\n`);
    }
    return made.leftOut.some((l) => l.failed) ? EXIT.failed : EXIT.ok;
  },
};
