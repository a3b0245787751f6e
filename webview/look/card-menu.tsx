import type { JSX, TargetedFocusEvent, TargetedKeyboardEvent, TargetedMouseEvent } from 'preact';
import type { CardView } from '../../src/core/protocol/panel';
import { useLook } from './context';

interface Props {
  readonly view: CardView;
  readonly index: number;
  readonly count: number;
}

/** What can be done with a step. Everything that changes it is an edit of the document and can be undone there. */
export function CardMenu({ view, index, count }: Props): JSX.Element {
  const { isOpen, setOpen, post } = useLook();
  const { id } = view;
  const fold = (name: 'params' | 'details', word: string): JSX.Element => (
    <button
      type="button"
      class="text-button"
      data-action={name}
      aria-expanded={isOpen(name, id)}
      onClick={() => setOpen(name, id, !isOpen(name, id))}
    >
      {word}
    </button>
  );
  return (
    <span class="card-menu">
      {fold('params', 'Parameters')}
      {fold('details', 'Details')}
      <details class="more" onFocusOut={closeWhenLeft} onClick={closeAfterChoice} onKeyDown={closeOnEscape}>
        <summary aria-label={`More for ${id}`}>More</summary>
        <div class="more-list">
          <button
            type="button"
            data-action="off"
            onClick={() => post({ type: 'edit', edit: { op: 'off', step: id, off: !view.off } })}
          >
            {view.off ? 'Switch on' : 'Switch off'}
          </button>
          <button
            type="button"
            data-action="duplicate"
            onClick={() => post({ type: 'edit', edit: { op: 'duplicate', step: id } })}
          >
            Duplicate
          </button>
          <button
            type="button"
            data-action="up"
            disabled={index === 0}
            onClick={() => post({ type: 'edit', edit: { op: 'move', step: id, to: index - 1 } })}
          >
            Move up
          </button>
          <button
            type="button"
            data-action="down"
            disabled={index === count - 1}
            onClick={() => post({ type: 'edit', edit: { op: 'move', step: id, to: index + 1 } })}
          >
            Move down
          </button>
          <button
            type="button"
            data-action="remove"
            onClick={() => post({ type: 'edit', edit: { op: 'remove', step: id } })}
          >
            Remove
          </button>
        </div>
      </details>
    </span>
  );
}

/** The list closes when something in it was chosen, when the focus leaves it, and on Escape. */
function closeAfterChoice(e: TargetedMouseEvent<HTMLDetailsElement>): void {
  if (e.target instanceof Element && e.target.closest('button')) e.currentTarget.open = false;
}

function closeWhenLeft(e: TargetedFocusEvent<HTMLDetailsElement>): void {
  if (!(e.relatedTarget instanceof Node && e.currentTarget.contains(e.relatedTarget)))
    e.currentTarget.open = false;
}

function closeOnEscape(e: TargetedKeyboardEvent<HTMLDetailsElement>): void {
  if (e.key !== 'Escape' || !e.currentTarget.open) return;
  e.stopPropagation();
  e.currentTarget.open = false;
  e.currentTarget.querySelector('summary')?.focus();
}
