import type { JSX } from 'preact';
import { useState } from 'preact/hooks';
import type { Quantity } from '../../src/core/data/quantity';
import { quantityText } from '../../src/core/figures/quantity-text';
import { useLook } from './context';

/** Key numbers, each with unit, convention and interval; how it is computed and from where is one click away. */
export function Numbers({
  numbers,
  step,
}: {
  readonly numbers: readonly Quantity[];
  readonly step: string;
}): JSX.Element {
  return (
    <dl class="numbers">
      {numbers.map((q) => (
        <Row key={q.id} quantity={q} step={step} />
      ))}
    </dl>
  );
}

function Row({ quantity: q, step }: { readonly quantity: Quantity; readonly step: string }): JSX.Element {
  const { copy } = useLook();
  const [open, setOpen] = useState(false);
  const { value, unit, interval, copy: plain } = quantityText(q);
  return (
    <div class="number-row" data-number={`${step}.${q.id}`}>
      <dt>
        {q.label}
        {q.convention !== undefined && <span class="convention">{q.convention}</span>}
      </dt>
      <dd>
        <span class="value">
          {value}
          {unit !== '' && <span class="unit"> {unit}</span>}
        </span>
        {interval !== undefined && <span class="interval">{interval}</span>}
        <span class="number-buttons">
          {q.explain && (
            <button
              type="button"
              class="text-button"
              aria-expanded={open}
              aria-label={`How ${q.label} is computed`}
              title={`${q.explain.formula}\n${q.explain.source}`}
              onClick={() => setOpen(!open)}
            >
              how
            </button>
          )}
          <button
            type="button"
            class="text-button"
            data-action="copy"
            aria-label={`Copy ${q.label}`}
            onClick={() => copy(plain, q.label)}
          >
            copy
          </button>
        </span>
        {open && q.explain && (
          <span class="explain">
            <code>{q.explain.formula}</code>
            <span class="muted">{q.explain.source}</span>
          </span>
        )}
      </dd>
    </div>
  );
}
