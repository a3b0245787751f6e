import { readFileSync, statSync } from 'node:fs';
import { dirname, resolve } from 'node:path';
import { UserError } from '../../core/data/errors';
import type { Card, Diagnostic, RecipeText, RunEvent, RunResult } from '../../core/protocol/engine';
import { onlyWord, type Args } from './args';
import type { World } from './world';
import { WorkerPool } from '../worker-pool';

export interface RecipeFile extends RecipeText {
  readonly path: string;
}

const MAX_RECIPE = 16 << 20;

/** Reads the recipe named by the first word. */
export function readRecipe(args: Args, world: World, usage: string): RecipeFile {
  const word = onlyWord(args, usage);
  const path = resolve(world.cwd, word);
  let stat;
  try {
    stat = statSync(path);
  } catch {
    throw new UserError('no-file', `${word}: there is no such file`, path);
  }
  if (stat.isDirectory())
    throw new UserError('directory', `${word} is a folder; name a recipe file (*.fringe.json)`, path);
  if (stat.size > MAX_RECIPE)
    throw new UserError(
      'too-large',
      `${word} has ${stat.size} bytes, too many for a recipe; is it a data file? Try: fringeside overview ${word}`,
      path,
    );
  return { path, text: readFileSync(path, 'utf8'), folder: dirname(path) };
}

export const diagnosticLine = (path: string, d: Diagnostic): string =>
  `${path}:${d.line}:${d.column}: ${d.severity}: ${d.message}\n`;

/** Runs a recipe with a progress line on stderr; problems of the recipe are printed with their positions. */
export async function runRecipe(recipe: RecipeFile, world: World, workers = 1): Promise<RunResult> {
  const { event, clear } = progressLine(world);
  const result =
    workers > 1 ? await onPool(recipe, world, workers, event) : await inProcess(recipe, world, event);
  clear();
  for (const d of result.diagnostics) world.err(diagnosticLine(recipe.path, d));
  return result;
}

async function inProcess(recipe: RecipeFile, world: World, event: (e: RunEvent) => void): Promise<RunResult> {
  const engine = await world.engine();
  return engine.run(recipe, { event, cancelled: () => world.cancelled() });
}

async function onPool(
  recipe: RecipeFile,
  world: World,
  workers: number,
  onEvent: (e: RunEvent) => void,
): Promise<RunResult> {
  const pool = new WorkerPool(world.dist, workers);
  const abort = new AbortController();
  // An interrupt sets a flag, which a thread at work does not see.
  const watch = setInterval(() => {
    if (world.cancelled()) abort.abort();
  }, 50);
  try {
    return await pool.run({ text: recipe.text, folder: recipe.folder }, { onEvent, signal: abort.signal });
  } finally {
    clearInterval(watch);
    await pool.dispose();
  }
}

function progressLine(world: World): { event: (e: RunEvent) => void; clear: () => void } {
  let width = 0;
  const show = (text: string): void => {
    if (!world.progress) return;
    const line = text.slice(0, world.columns - 1);
    world.err(`\r${line.padEnd(width)}`);
    width = line.length;
  };
  return {
    event: (e) => {
      if (e.type === 'running')
        show(`${e.id}: ${Math.round(100 * e.fraction)} %${e.note === undefined ? '' : ` ${e.note}`}`);
    },
    clear: () => {
      if (width > 0) world.err(`\r${' '.repeat(width)}\r`);
      width = 0;
    },
  };
}

export const failedCards = (result: RunResult): readonly Card[] =>
  result.cards.filter((c) => c.state === 'failed' || c.state === 'blocked');
