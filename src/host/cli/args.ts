import { hint, nearestNames } from '../../core/data/nearest';
import { UserError } from '../../core/data/errors';

export interface OptionSpec {
  readonly name: string;
  /** Name of its value in the help; absent for a switch. */
  readonly value?: string;
  readonly help: string;
}

export interface Args {
  readonly words: readonly string[];
  readonly options: ReadonlyMap<string, string>;
}

/** The one word a command takes; anything else is a wrong use. */
export function onlyWord(args: Args, usage: string): string {
  const word = args.words.at(0);
  if (word === undefined || args.words.length > 1) throw new UserError('usage', `usage: fringeside ${usage}`);
  return word;
}

/** Splits arguments into words and `--name value` or `--name=value` options. Unknown options name the nearest. */
export function parseArgs(argv: readonly string[], known: readonly OptionSpec[]): Args {
  const words: string[] = [];
  const options = new Map<string, string>();
  for (let i = 0; i < argv.length; i++) {
    const arg = argv[i];
    if (arg === '--') {
      words.push(...argv.slice(i + 1));
      break;
    }
    if (!arg.startsWith('--') || arg.length < 3) {
      words.push(arg);
      continue;
    }
    const parts = arg.slice(2).split(/=(.*)/s);
    const name = parts[0];
    const inline = parts.at(1);
    const spec = known.find((o) => o.name === name);
    if (!spec) {
      const names = known.map((o) => o.name);
      const all = names.length > 0 ? ` It takes ${names.map((n) => `--${n}`).join(', ')}.` : '';
      throw new UserError('usage', `unknown option --${name}.${hint(nearestNames(name, names)) || all}`);
    }
    if (spec.value === undefined) {
      if (inline !== undefined) throw new UserError('usage', `--${name} takes no value`);
      options.set(name, '');
      continue;
    }
    const value = inline ?? argv.at(++i);
    if (value === undefined) throw new UserError('usage', `--${name} needs a value: --${name} ${spec.value}`);
    options.set(name, value);
  }
  return { words, options };
}
