import type { JSX } from 'preact';
import { useEffect, useState } from 'preact/hooks';
import type { InputView, LookState } from '../../src/core/protocol/panel';
import { LINK_GROUPS, type LinkGroup } from '../figure/views';
import { instantAfter, utcOf } from '../words/instants';
import { numberText, secondsText } from '../../src/core/figures/shown-number';
import { useLook } from './context';

const LINK_WORDS: Readonly<Record<LinkGroup, string>> = {
  time: 'link time axes',
  frequency: 'link frequency axes',
};

const RUN_WORDS = { running: 'running', broken: 'broke off', held: 'not run' } as const;

/** Title, run state, and the inputs with where their numbers come from. */
export function LookHeader({ look }: { readonly look: LookState }): JSX.Element {
  const { post, views } = useLook();
  const [, again] = useState(0);
  useEffect(() => views.onChange(() => again((n) => n + 1)), [views]);
  const running = look.run.state === 'running';
  const done = look.cards.filter((c) => c.state === 'done').length;
  return (
    <header class="look-head">
      <div class="title-line">
        <h1>{look.title ?? look.name}</h1>
        {look.title !== undefined && <span class="muted">{look.name}</span>}
        {look.unsaved && <span class="tag">not saved</span>}
        <span class="push" />
        {LINK_GROUPS.filter((g) => views.count(g) > 1).map((g) => (
          <label key={g} class="link">
            <input
              type="checkbox"
              data-link={g}
              checked={views.isLinked(g)}
              onChange={(e) => views.setLinked(g, e.currentTarget.checked)}
            />
            {LINK_WORDS[g]}
          </label>
        ))}
        <span class="run-state" data-run={look.run.state}>
          {look.run.state === 'idle' ? '' : `${RUN_WORDS[look.run.state]}, `}
          {done} of {look.cards.length} steps done
        </span>
        {running ? (
          <button type="button" data-action="cancel" onClick={() => post({ type: 'cancel' })}>
            Cancel
          </button>
        ) : (
          <button type="button" class="quiet" data-action="run" onClick={() => post({ type: 'run' })}>
            Run again
          </button>
        )}
      </div>
      {look.run.message !== undefined && (
        <p class="run-message" role="alert">
          {look.run.message}
        </p>
      )}
      <div class="inputs">
        {look.inputs.map((i) => (
          <Input key={i.name} input={i} />
        ))}
      </div>
    </header>
  );
}

function Input({ input }: { readonly input: InputView }): JSX.Element {
  const { copy } = useLook();
  const { name, spec, facts } = input;
  const end = facts && instantAfter(facts.start, facts.duration, 9);
  return (
    <dl class="input" data-input={name}>
      <div class="input-name">
        <dt>input</dt>
        <dd>
          <b>{name}</b>
        </dd>
      </div>
      <div>
        <dt>file</dt>
        <dd>{spec.file}</dd>
      </div>
      <div>
        <dt>channel</dt>
        <dd>
          {facts?.channel ?? spec.channel ?? '–'}
          {facts && facts.unit !== '' && <span class="unit"> in {facts.unit}</span>}
        </dd>
      </div>
      {facts && (
        <>
          <div>
            <dt>span, GPS</dt>
            <dd title={`start: ${facts.startFrom}`}>
              {facts.startKnown ? `${facts.start} to ${end?.gps ?? ''}` : 'start not known'}{' '}
              <span class="muted">({secondsText(facts.duration)})</span>
            </dd>
          </div>
          {facts.startKnown && (
            <div>
              <dt>span, UTC</dt>
              <dd>
                {utcOf(facts.start)} to {end?.utc}
              </dd>
            </div>
          )}
          <div>
            <dt>samples</dt>
            <dd title={`rate: ${facts.rateFrom}`}>
              {numberText(facts.samples)} at {numberText(facts.rate, 9)} Hz
              {facts.notFinite > 0 && `, ${numberText(facts.notFinite)} not finite`}
              {facts.gaps.length > 0 && `, ${facts.gaps.length} ${facts.gaps.length === 1 ? 'gap' : 'gaps'}`}
            </dd>
          </div>
          <div>
            <dt>SHA-256 of the samples</dt>
            <dd>
              <button
                type="button"
                class="text-button mono"
                title={`${facts.sha256}: copy`}
                onClick={() => copy(facts.sha256, 'SHA-256')}
              >
                {facts.sha256.slice(0, 12)}…
              </button>
            </dd>
          </div>
        </>
      )}
    </dl>
  );
}
