import type { JSX } from 'preact';
import { memo } from 'preact/compat';
import type { Figure } from '../../src/core/figures/figure';
import type { CardError } from '../../src/core/protocol/engine';
import type { CardView } from '../../src/core/protocol/panel';
import { FigureBox } from '../figure/figure-box';
import { DataTable } from '../figure/table';
import { AskRate } from './ask-rate';
import { CardMenu } from './card-menu';
import { useLook } from './context';
import { Details } from './details';
import { nextSteps, spanSteps } from './next-steps';
import { Numbers } from './numbers';
import { Offers } from './offers';
import { ParamForm } from './param-form';
import { figureKey } from './state';
import { Warnings } from './warnings';

interface Props {
  readonly view: CardView;
  readonly redrawn: ReadonlyMap<string, Figure>;
  readonly index: number;
  readonly count: number;
}

/** A step: sentence, pictures, numbers, warnings, parameters. */
function CardBody({ view, redrawn, index, count }: Props): JSX.Element {
  const { isOpen, setOpen, post, copy, views, requests, names, steps } = useLook();
  const { id, card, state } = view;
  const collapsed = isOpen('collapsed', id);
  const isShown = state !== 'off' && card !== undefined && card.state === 'done';
  const error = state === 'failed' || state === 'blocked' ? (view.failure ?? card?.error) : undefined;
  const result = card?.provenance?.fingerprint ?? '';
  const pending = !isShown && (state === 'waiting' || state === 'running');
  const toCard = (): void => document.querySelector<HTMLElement>(`[data-card="${CSS.escape(id)}"]`)?.focus();
  return (
    <section
      class="card"
      data-card={id}
      data-do={view.do}
      data-state={state}
      tabIndex={0}
      aria-labelledby={`title-${id}`}
    >
      <div class="card-head">
        <button
          type="button"
          class="fold"
          aria-expanded={!collapsed}
          aria-label={collapsed ? `Show ${id}` : `Fold ${id}`}
          onClick={() => setOpen('collapsed', id, !collapsed)}
        >
          <svg viewBox="0 0 10 10" aria-hidden="true">
            <path d={collapsed ? 'M3 1l4 4-4 4z' : 'M1 3l4 4 4-4z'} fill="currentColor" />
          </svg>
        </button>
        <h2 id={`title-${id}`}>
          {view.title} <span class="card-id">{id}</span>
        </h2>
        <span class="of">{view.of.length > 0 && `of ${view.of.join(', ')}`}</span>
        <span class="state" data-word={state}>
          {state}
        </span>
        <span class="push" />
        <CardMenu view={view} index={index} count={count} />
      </div>
      {state === 'running' && (
        <div class="progress">
          <progress max={1} value={view.fraction ?? 0} aria-label={`${view.title} ${id}`} />
          <span class="muted">{view.note ?? `${Math.round(100 * (view.fraction ?? 0))} %`}</span>
          <button type="button" data-action="cancel" onClick={() => post({ type: 'cancel' })}>
            Cancel
          </button>
        </div>
      )}
      {!collapsed && (
        <>
          {isOpen('params', id) && <ParamForm view={view} />}
          {error && <Failure error={error} state={state} />}
          {isShown && (
            <div
              class="card-body"
              data-numbers={card.numbers.length > 2 + 8 * card.figures.length ? 'below' : 'beside'}
              data-faded={state !== 'done'}
            >
              {card.sentence !== '' && <p class="sentence">{card.sentence}</p>}
              <Warnings warnings={card.warnings} step={id} />
              <div class="card-main">
                {card.figures.map((f) => {
                  const key = figureKey(id, f.id);
                  return (
                    <FigureBox
                      key={f.id}
                      figure={f}
                      redrawn={redrawn.get(key)}
                      viewKey={key}
                      views={views}
                      result={result}
                      onViewport={(viewport) =>
                        result !== '' &&
                        post({
                          type: 'redraw',
                          request: requests.start(key),
                          id,
                          fingerprint: result,
                          viewport,
                        })
                      }
                      onCopy={copy}
                      onPicture={(svg) => post({ type: 'save-picture', name: `${id}-${f.id}`, svg })}
                      onLeave={toCard}
                      underPlot={(x) => (
                        <Offers
                          word="With this stretch:"
                          offers={spanSteps(view, f.x, x, names, new Set(steps.keys()))}
                        />
                      )}
                      asText={isOpen('asText', key)}
                      onAsText={(on) => setOpen('asText', key, on)}
                    />
                  );
                })}
                {card.tables.map((t) => (
                  <DataTable key={t.id} table={t} onCopy={copy} />
                ))}
              </div>
              <Offers word="Go on with:" offers={nextSteps(view, names, steps.values())} />
              {card.numbers.length > 0 && <Numbers numbers={card.numbers} step={id} />}
            </div>
          )}
          {pending && <div class="plot-frame placeholder" aria-hidden="true" />}
          {isOpen('details', id) && card?.provenance && (
            <Details provenance={card.provenance} step={view.do} />
          )}
        </>
      )}
    </section>
  );
}

function Failure({ error, state }: { readonly error: CardError; readonly state: string }): JSX.Element {
  return (
    <div class="failure" role={state === 'failed' ? 'alert' : undefined} data-code={error.code}>
      <p>{error.message}</p>
      {error.code === 'needs-rate' && error.input !== undefined && <AskRate input={error.input} />}
      {error.stack !== undefined && (
        <details>
          <summary>Where it happened, for a bug report</summary>
          <pre>{error.stack}</pre>
        </details>
      )}
    </div>
  );
}

export const CardSection = memo(CardBody);
