import type { JSX } from 'preact';
import type { StepProvenance } from '../../src/core/protocol/engine';
import { numberText } from '../../src/core/figures/shown-number';
import { useLook } from './context';
import { valueText } from './param-text';

/** Provenance: what exactly was run, with which parameters, and what the method rests on. */
export function Details({
  provenance: p,
  step,
}: {
  readonly provenance: StepProvenance;
  readonly step: string;
}): JSX.Element {
  const { steps, copy } = useLook();
  const description = steps.get(step);
  return (
    <div class="details">
      <dl>
        <dt>step</dt>
        <dd>
          {p.step}, version {p.version}
        </dd>
        <dt>of</dt>
        <dd>{p.of.join(', ')}</dd>
        <dt>time taken</dt>
        <dd>
          {numberText(p.seconds, 3)} s{p.cached && ', taken from an earlier run'}
        </dd>
        <dt>fingerprint</dt>
        <dd>
          <button
            type="button"
            class="text-button mono"
            title="Copy"
            onClick={() => copy(p.fingerprint, 'fingerprint')}
          >
            {p.fingerprint.slice(0, 16)}…
          </button>
        </dd>
        {Object.entries(p.params).map(([key, v]) => (
          <>
            <dt>{key}</dt>
            <dd>
              {valueText(v)} {unitOf(description?.params[key])}
            </dd>
          </>
        ))}
      </dl>
      {description && description.sources.length > 0 && (
        <ul class="sources">
          {description.sources.map((s, i) => (
            <li key={i}>
              {s.text} <span class="muted">({s.flag})</span>
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}

function unitOf(param: { readonly unit?: string } | object | undefined): string {
  return param && 'unit' in param ? (param.unit ?? '') : '';
}
