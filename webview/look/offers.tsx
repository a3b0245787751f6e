import type { JSX } from 'preact';
import { useLook } from './context';
import type { Offer } from './next-steps';

/** Buttons that each add a step with one click; undo takes it back. */
export function Offers({
  word,
  offers,
}: {
  readonly word: string;
  readonly offers: readonly Offer[];
}): JSX.Element | null {
  const { post } = useLook();
  if (offers.length === 0) return null;
  return (
    <p class="offers">
      <span class="muted">{word}</span>
      {offers.map(({ label, step }) => (
        <button
          type="button"
          key={label}
          class="text-button"
          data-offer={step.do}
          onClick={() => post({ type: 'edit', edit: { op: 'add', step } })}
        >
          {label}
        </button>
      ))}
    </p>
  );
}
