import type { JSX } from 'preact';
import type { Diagnostic } from '../../src/core/protocol/engine';
import { Sign } from '../page/sign';
import { useLook } from './context';

/** Problems of the recipe's text with their places; a click shows the place in the text. */
export function Problems({ problems }: { readonly problems: readonly Diagnostic[] }): JSX.Element | null {
  const { post } = useLook();
  if (problems.length === 0) return null;
  return (
    <section class="problems" data-problems={problems.length} aria-label="Problems in the recipe">
      <h2>
        {problems.length} {problems.length === 1 ? 'problem' : 'problems'} in the recipe
      </h2>
      <ul>
        {problems.map((p, i) => (
          <li key={i} data-code={p.code}>
            <Sign severity={p.severity === 'error' ? 'problem' : 'caution'} />
            <button
              type="button"
              class="place"
              title="Show in the text"
              onClick={() => post({ type: 'open-text', offset: p.from })}
            >
              line {p.line}, column {p.column}
            </button>
            <span>{p.message}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
