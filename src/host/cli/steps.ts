import { UserError } from '../../core/data/errors';
import { hint, nearestNames } from '../../core/data/nearest';
import { kindWords } from '../../core/recipe/ports';
import { steps } from '../../core/steps';
import type { AnyStep, Param } from '../../core/steps/define';
import type { Command } from './cli';
import { columns, wrap } from './format';
import { EXIT } from './world';

const registry: Readonly<Record<string, AnyStep>> = steps;

/** `fringeside steps`: the operations there are, and one in full. */
export const stepsCommand: Command = {
  name: 'steps',
  usage: 'steps [ID]',
  help: 'lists the steps a recipe can use, or explains one',
  options: [],
  run(args, world) {
    const id = args.words.at(0);
    if (id === undefined) {
      world.out(columns(Object.values(registry).map((s) => [s.id, s.group, s.summary])));
      return Promise.resolve(EXIT.ok);
    }
    const step = Object.hasOwn(registry, id) ? registry[id] : undefined;
    if (!step)
      throw new UserError(
        'unknown-step',
        `there is no step "${id}".${hint(nearestNames(id, Object.keys(registry)))}`,
      );
    world.out(stepText(step, world.columns));
    return Promise.resolve(EXIT.ok);
  },
};

function stepText(step: AnyStep, width: number): string {
  const ports = step.takes.map(
    (p) =>
      `  ${kindWords(p.kind)}${p.count === 'one' ? '' : p.count === 'optional' ? ', optional' : ', one or more'}: ${p.help}\n`,
  );
  const params = Object.entries(step.params).flatMap(([key, p]) => [
    `  ${key} = ${JSON.stringify(p.default)}${paramNotes(p)}\n`,
    wrap(`      ${p.label}. ${p.help}`, width, '      '),
  ]);
  const sources = step.sources.map((s) => wrap(`  ${s.text} [${s.flag}]`, width, '    '));
  return [
    `${step.id} (version ${step.version}): ${step.title}\n`,
    wrap(step.summary, width),
    '\nTakes\n',
    ...ports,
    `\nGives ${kindWords(step.gives)}\n`,
    '\nParameters\n',
    ...params,
    '\nSources\n',
    ...sources,
  ].join('');
}

/** Unit, bounds and choices of a parameter in words. */
export function paramNotes(p: Param): string {
  const notes: string[] = [];
  if ('unit' in p && p.unit !== '') notes.push(p.unit);
  if (p.kind === 'choice') notes.push(p.choices.join(' | '));
  if ((p.kind === 'number' || p.kind === 'list') && p.min !== undefined)
    notes.push(`${p.kind === 'number' && p.exclusiveMin === true ? 'above' : 'from'} ${p.min}`);
  if ((p.kind === 'number' || p.kind === 'list') && p.max !== undefined) notes.push(`up to ${p.max}`);
  return notes.length === 0 ? '' : `  (${notes.join(', ')})`;
}
