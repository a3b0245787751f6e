import type { JSX } from 'preact';
import { useState } from 'preact/hooks';
import type { Addable } from '../../src/core/protocol/panel';
import { useLook } from './context';

const GROUPS: readonly (readonly [Addable['group'], string])[] = [
  ['look', 'Look'],
  ['noise', 'Noise'],
  ['condition', 'Condition'],
  ['picture', 'Picture'],
  ['signal', 'Signal'],
  ['search', 'Search'],
];

/** The steps that the data at hand can feed, by group; one click adds one at the end. */
export function AddStep({ addable }: { readonly addable: readonly Addable[] }): JSX.Element {
  const { post } = useLook();
  const [open, setOpen] = useState(false);
  const add = (a: Addable): void => {
    setOpen(false);
    post({ type: 'edit', edit: { op: 'add', step: { do: a.do, of: a.of } } });
  };
  return (
    <section class="add-step" aria-label="Add a step">
      <button type="button" data-action="add-step" aria-expanded={open} onClick={() => setOpen(!open)}>
        Add a step…
      </button>
      {open && (
        <div class="add-list">
          {GROUPS.map(([group, word]) => {
            const steps = addable.filter((a) => a.group === group);
            return (
              steps.length > 0 && (
                <section key={group}>
                  <h3>{word}</h3>
                  {steps.map((a) => (
                    <button type="button" key={a.do} class="add-item" data-add={a.do} onClick={() => add(a)}>
                      <b>{a.title}</b> {a.of.length > 0 && <span class="muted">of {a.of.join(', ')}</span>}
                      <span class="add-summary">{a.summary}</span>
                    </button>
                  ))}
                </section>
              )
            );
          })}
        </div>
      )}
    </section>
  );
}
