import { CancelledError, UserError } from '../../core/data/errors';
import { hint, nearestNames } from '../../core/data/nearest';
import { VERSION } from '../version';
import { parseArgs, type Args, type OptionSpec } from './args';
import { demo } from './demo';
import { exportCommand } from './export';
import { overview } from './overview';
import { run } from './run';
import { stepsCommand } from './steps';
import { verifyCommand } from './verify';
import { EXIT, type World } from './world';

export interface Command {
  readonly name: string;
  readonly usage: string;
  readonly help: string;
  readonly options: readonly OptionSpec[];
  run(args: Args, world: World): Promise<number>;
}

const COMMANDS: readonly Command[] = [overview, run, verifyCommand, exportCommand, stepsCommand, demo];

function help(command?: Command): string {
  if (command) {
    const options = command.options.map(
      (o) => `  --${o.name}${o.value === undefined ? '' : ` ${o.value}`}\n      ${o.help}\n`,
    );
    return `Usage: fringeside ${command.usage}\n\n${command.help}\n${options.length > 0 ? `\nOptions:\n${options.join('')}` : ''}`;
  }
  const width = Math.max(...COMMANDS.map((c) => c.usage.length));
  return [
    `fringeside ${VERSION}: looks at strain data by recipes`,
    '',
    ...COMMANDS.map((c) => `  fringeside ${c.usage.padEnd(width)}  ${c.help.split('\n')[0]}`),
    '',
    'fringeside COMMAND --help tells more. Exit codes: 0 done, 1 numbers differ (verify), 2 wrong usage, recipe or data,',
    '3 a step failed, 70 an error in fringeside itself, 130 stopped.',
    '',
  ].join('\n');
}

/** Runs one command line; returns the exit code. A user's error is one line, a bug its stack. */
export async function runCli(argv: readonly string[], world: World): Promise<number> {
  try {
    const name = argv.at(0);
    const rest = argv.slice(1);
    if (name === undefined || name === '--help' || name === 'help') {
      world.out(help());
      return name === undefined ? EXIT.user : EXIT.ok;
    }
    if (name === '--version') {
      world.out(`${VERSION}\n`);
      return EXIT.ok;
    }
    const command = COMMANDS.find((c) => c.name === name);
    if (!command) {
      const names = COMMANDS.map((c) => c.name);
      throw new UserError(
        'usage',
        `unknown command "${name}".${hint(nearestNames(name, names)) || ` Commands: ${names.join(', ')}.`}`,
      );
    }
    if (rest.includes('--help')) {
      world.out(help(command));
      return EXIT.ok;
    }
    return await command.run(parseArgs(rest, command.options), world);
  } catch (e) {
    if (e instanceof CancelledError) {
      world.err('stopped\n');
      return EXIT.interrupted;
    }
    if (e instanceof UserError) {
      world.err(`fringeside: ${e.message}\n`);
      return EXIT.user;
    }
    world.err(
      `fringeside: internal error, please report it\n${e instanceof Error ? (e.stack ?? e.message) : String(e)}\n`,
    );
    return EXIT.bug;
  }
}
