import type { JSX } from 'preact';
import type { StepDescription } from '../../src/core/protocol/engine';
import type { CardView, NamedKind } from '../../src/core/protocol/panel';
import { useLook } from './context';
import { assignPorts, ofFromPorts, type PortNames } from './ports';

type Ports = StepDescription['takes'];

/** What the step consumes: one choice per kind of data, of the inputs and steps that give it. */
export function OfForm({ view, takes }: { readonly view: CardView; readonly takes: Ports }): JSX.Element {
  const { names, post } = useLook();
  const given = assignPorts(takes, view.of, names);
  const send = (ports: PortNames): void =>
    post({ type: 'edit', edit: { op: 'set', step: view.id, params: { of: ofFromPorts(ports) } } });
  const replace = (i: number, chosen: readonly string[]): void =>
    send(given.map((old, k) => (k === i ? chosen : old)));
  return (
    <>
      {takes.map((port, i) => {
        const fit = names.filter((n) => n.kind === port.kind && n.name !== view.id);
        const id = `${view.id}-of-${i}`;
        return (
          <div class="field" key={i}>
            <span class="field-label" id={id}>
              Takes {port.kind}
              {port.count === 'optional' && ', if given'}
            </span>
            <div class="field-input">
              {port.count === 'many' ? (
                <Many id={id} fit={fit} chosen={given[i] ?? []} onChoose={(c) => replace(i, c)} />
              ) : (
                <select
                  data-of={i}
                  aria-labelledby={id}
                  value={given[i]?.[0] ?? ''}
                  onChange={(e) => replace(i, e.currentTarget.value === '' ? [] : [e.currentTarget.value])}
                >
                  {(port.count === 'optional' || given[i]?.length === 0) && <option value="">none</option>}
                  {fit.map((n) => (
                    <option key={n.name} value={n.name}>
                      {n.name}
                    </option>
                  ))}
                </select>
              )}
            </div>
            <p class="help">{port.help}</p>
          </div>
        );
      })}
    </>
  );
}

interface ManyProps {
  readonly id: string;
  readonly fit: readonly NamedKind[];
  readonly chosen: readonly string[];
  readonly onChoose: (chosen: readonly string[]) => void;
}

function Many({ id, fit, chosen, onChoose }: ManyProps): JSX.Element {
  return (
    <span role="group" aria-labelledby={id} class="many">
      {fit.map(({ name }) => (
        <label key={name}>
          <input
            type="checkbox"
            checked={chosen.includes(name)}
            onChange={(e) =>
              onChoose(e.currentTarget.checked ? [...chosen, name] : chosen.filter((c) => c !== name))
            }
          />
          {name}
        </label>
      ))}
    </span>
  );
}
