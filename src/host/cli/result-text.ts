import type { Warning } from '../../core/data/quantity';
import type { Card, InputProvenance, RunResult } from '../../core/protocol/engine';
import { vettingText } from './vetting-text';
import { columns, number, quantityValue, tableText, wrap } from './format';

/** Said wherever a result is printed, so that no number is taken for more than it is. */
export const CAUTION =
  'A quick look is not a detection statement: calibration uncertainty, your collaboration’s own review and local procedure decide.';

/** A run's result as text for a terminal. */
export function resultText(result: RunResult, width: number): string {
  const w = Math.max(40, Math.min(width, 120));
  return [
    ...result.inputs.map((i) => inputText(i)),
    ...result.cards.map((c) => cardText(c, w)),
    vettingText(result),
    '\n',
    wrap(CAUTION, w),
  ].join('');
}

function inputText(i: InputProvenance): string {
  const gaps =
    i.gaps.length === 0
      ? 'no gaps'
      : `${i.gaps.length} gap${i.gaps.length === 1 ? '' : 's'}, ${number(i.gaps.reduce((s, g) => s + g.seconds, 0))} s in all`;
  return [
    `input ${i.name}: ${i.file} ${i.channel}, ${i.samples} samples at ${number(i.rate)} Hz ${i.startKnown ? `from GPS ${i.start}` : 'with unknown start'}, ${gaps}\n`,
    `  rate: ${i.rateFrom}; start: ${i.startFrom}; SHA-256 of the samples ${i.sha256.slice(0, 16)}…\n`,
  ].join('');
}

function cardText(c: Card, w: number): string {
  const head = `\n── ${c.id}: ${c.title} ${'─'.repeat(Math.max(2, w - c.id.length - c.title.length - 6))}\n`;
  if (c.state !== 'done')
    return `${head}${wrap(`${c.state}: ${c.error?.message ?? ''}`, w)}${c.error?.stack === undefined ? '' : `${c.error.stack}\n`}`;
  return [
    head,
    wrap(c.sentence, w),
    columns(
      c.numbers.map((q) => [q.label, quantityValue(q)]),
      [],
      '  ',
    ),
    ...c.tables.map((t) => tableText(t, '  ')),
    ...c.warnings.map((x) => warningText(x, w)),
  ].join('');
}

function warningText(x: Warning, w: number): string {
  return wrap(`  ${x.severity} [${x.code}] ${x.found}. ${x.consequence} ${x.remedy}`, w, '    ');
}
