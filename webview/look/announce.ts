import type { LookState } from '../../src/core/protocol/panel';

/** What a screen reader should hear of a change: cards that finished or failed, and the end of a run. */
export function announcement(
  before: LookState | undefined,
  after: LookState | undefined,
): string | undefined {
  if (!after) return undefined;
  const old = new Map(before?.cards.map((c) => [c.id, c.state]));
  const news = after.cards
    .filter((c) => ['done', 'failed', 'cancelled', 'blocked'].includes(c.state) && old.get(c.id) !== c.state)
    .map((c) => `${c.title} ${c.id}: ${c.state}`);
  if (before?.run.state === 'running' && after.run.state === 'idle') {
    const done = after.cards.filter((c) => c.state === 'done').length;
    news.push(`Run ended, ${done} of ${after.cards.length} steps done`);
  }
  if (before && before.problems.length !== after.problems.length && after.problems.length > 0)
    news.push(`${after.problems.length} problems in the recipe's text`);
  return news.length === 0 ? undefined : news.join('. ');
}
