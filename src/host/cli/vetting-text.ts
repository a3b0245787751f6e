import type { Card, RunResult } from '../../core/protocol/engine';
import type { Cell } from '../../core/data/table';
import { columns, number } from './format';

/** Chance below which a peak does not look like its template, as the step itself warns. */
const UNLIKELY = 1e-3;
/** A peak less than this above what noise is expected to reach once tells nothing. */
const CLEAR = 1;

/**
 * The candidates of a run and what has been tested of them so far, loudest first within each site: a line each with the
 * numbers and whether it passes, fails, or nothing can be told. Empty when the run tested none.
 */
export function vettingText(result: RunResult): string {
  const rows = result.cards.flatMap((card) => candidates(card, result));
  if (rows.length === 0) return '';
  const head = ['tested by', 'GPS time', '|SNR|', 'χ²/freedom', 'chance', 're-weighted', 'so far'];
  const right = [false, false, true, true, true, true, false];
  return `\nVetting so far\n${columns([head, ...rows], right, '  ')}`;
}

function candidates(card: Card, result: RunResult): string[][] {
  const table = card.state === 'done' ? card.tables.find((t) => t.id === 'consistency') : undefined;
  if (!table) return [];
  const filter = result.cards.find((c) => card.of.includes(c.id));
  const noise = filter?.numbers.find((n) => n.id === 'expected-loudest')?.value ?? 0;
  return table.rows.map((row) => {
    const at = (id: string): Cell => row[table.columns.findIndex((c) => c.id === id)];
    const value = (id: string): number => Number(at(id));
    const numbers = ['snr', 'reduced', 'p-value', 'reweighted'].map((id) => number(value(id), 4));
    return [
      card.id,
      String(at('gps')),
      ...numbers,
      verdict(value('snr'), value('p-value'), value('shape-p-value'), noise),
    ];
  });
}

function verdict(snr: number, chance: number, shape: number, noise: number): string {
  if (chance < UNLIKELY || shape < UNLIKELY) return 'fails: not the shape of the template';
  if (snr < noise + CLEAR) return `can’t tell: noise alone reaches ${number(noise, 3)}`;
  return 'passes: the shape of the template';
}
