import { UserError } from '../../core/data/errors';
import { parseRecipe } from '../../core/recipe/parse';
import { verify } from '../../core/recipe/verify';
import type { Command } from './cli';
import { columns, number } from './format';
import { readRecipe, runRecipe } from './recipe-file';
import { EXIT } from './world';

const USAGE = 'verify RECIPE';

/** `fringeside verify`: reruns a recipe and compares with the numbers written in its `expect`. */
export const verifyCommand: Command = {
  name: 'verify',
  usage: USAGE,
  help: 'reruns a recipe and compares with its "expect"\nEach expectation has a value and a relative or absolute tolerance (1e-9 relative if it names none).',
  options: [],
  async run(args, world) {
    const recipe = readRecipe(args, world, USAGE);
    const expect = parseRecipe(recipe.text).recipe?.expect;
    const result = await runRecipe(recipe, world);
    if (result.cards.length === 0) return EXIT.user;
    if (!expect)
      throw new UserError('no-expect', `${recipe.path} has no "expect": there is nothing to compare with`);
    const verdicts = verify(result, expect);
    const rows = verdicts.map((v) => [
      v.ok ? 'agrees' : 'DIFFERS',
      v.key,
      v.found === undefined ? '–' : number(v.found, 12),
      `expected ${number(v.expected, 12)} ± ${number(v.tolerance, 3)}${v.unit === '' ? '' : ` ${v.unit}`}`,
      v.ok ? '' : v.why,
    ]);
    world.out(columns(rows, [false, false, true]));
    const wrong = verdicts.filter((v) => !v.ok).length;
    world.out(
      wrong === 0
        ? `all ${verdicts.length} numbers agree\n`
        : `${wrong} of ${verdicts.length} numbers differ\n`,
    );
    if (world.cancelled()) return EXIT.interrupted;
    return wrong === 0 ? EXIT.ok : EXIT.differs;
  },
};
