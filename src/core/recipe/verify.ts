import type { RunResult } from '../protocol/engine';
import type { Expectation } from './recipe';

export interface Verdict {
  readonly key: string;
  readonly expected: number;
  /** Largest difference allowed, in the number's own unit. */
  readonly tolerance: number;
  readonly found: number | undefined;
  readonly unit: string;
  readonly ok: boolean;
  readonly why: string;
}

/** Relative tolerance of an expectation that names none: the same code on another machine agrees far better. */
export const DEFAULT_REL = 1e-9;

/** Compares a run with the recipe's `expect`: one verdict per expectation, in its order. */
export function verify(result: RunResult, expect: Readonly<Record<string, Expectation>>): Verdict[] {
  return Object.entries(expect).map(([key, e]) => {
    const dot = key.indexOf('.');
    const card = result.cards.find((c) => c.id === key.slice(0, dot));
    const quantity = card?.numbers.find((n) => n.id === key.slice(dot + 1));
    const rel = e.rel ?? (e.abs === undefined ? DEFAULT_REL : 0);
    const tolerance = Math.max(rel * Math.abs(e.value), e.abs ?? 0);
    const found = quantity?.value;
    const unit = quantity?.unit ?? '';
    if (found === undefined) {
      const why =
        card === undefined
          ? 'no such step in the recipe'
          : card.state !== 'done'
            ? `the step did not finish: ${card.error?.message ?? card.state}`
            : `the step gives no number of that name; it gives ${card.numbers.map((n) => n.id).join(', ')}`;
      return { key, expected: e.value, tolerance, found, unit, ok: false, why };
    }
    const off = Math.abs(found - e.value);
    const ok = off <= tolerance;
    return {
      key,
      expected: e.value,
      tolerance,
      found,
      unit,
      ok,
      why: ok ? 'agrees' : `differs by ${off.toExponential(2)}`,
    };
  });
}
