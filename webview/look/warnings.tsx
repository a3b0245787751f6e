import type { JSX } from 'preact';
import type { RecipeFix, Warning } from '../../src/core/data/quantity';
import type { RecipeEdit } from '../../src/core/protocol/panel';
import { Sign } from '../page/sign';
import { useLook } from './context';

/** Warnings: what was found, what follows from it, what to do, and a button that does it. */
export function Warnings({
  warnings,
  step,
}: {
  readonly warnings: readonly Warning[];
  readonly step: string;
}): JSX.Element | null {
  const { post } = useLook();
  if (warnings.length === 0) return null;
  return (
    <ul class="warnings">
      {warnings.map((w, i) => (
        <li key={`${w.code}-${i}`} data-warning={w.code} class={`warning warning-${w.severity}`}>
          <p class="found">
            <Sign severity={w.severity} /> {w.found}
          </p>
          <p>{w.consequence}</p>
          <p class="remedy">{w.remedy}</p>
          <p class="warning-foot">
            {w.fix && (
              <button
                type="button"
                data-action="fix"
                onClick={() => w.fix && post({ type: 'edit', edit: editOf(w.fix, step) })}
              >
                {w.fix.label}
              </button>
            )}
            <code class="muted">{w.code}</code>
          </p>
        </li>
      ))}
    </ul>
  );
}

function editOf(fix: RecipeFix, step: string): RecipeEdit {
  return fix.kind === 'set'
    ? { op: 'set', step, params: fix.params }
    : { op: 'input', input: fix.input, values: fix.values };
}
