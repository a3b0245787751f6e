import type { JSX } from 'preact';
import type { Warning } from '../../src/core/data/quantity';

const SHAPES: Readonly<Record<Warning['severity'], JSX.Element>> = {
  note: <circle cx="8" cy="8" r="6" />,
  caution: <path d="M8 2 15 14 1 14Z" />,
  problem: <path d="M5 1h6l4 4v6l-4 4H5l-4-4V5Z" />,
};

/** Severity by shape and word; colour only adds to it. */
export function Sign({ severity }: { readonly severity: Warning['severity'] }): JSX.Element {
  return (
    <span class={`sign sign-${severity}`}>
      <svg viewBox="0 0 16 16" aria-hidden="true" fill="none" stroke="currentColor" stroke-width="1.6">
        {SHAPES[severity]}
      </svg>
      {severity}
    </span>
  );
}
