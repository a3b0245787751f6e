import type { JSX } from 'preact';
import { useEffect, useMemo, useRef, useState } from 'preact/hooks';
import type { FromLookPage, ToLookPage } from '../../src/core/protocol/panel';
import { plotWidth } from '../figure/figure-box';
import { Views } from '../figure/views';
import type { Host } from '../page/host';
import { AddStep } from './add-step';
import { announcement } from './announce';
import { CardSection } from './card';
import { Look, type LookContext } from './context';
import { LookHeader } from './header';
import { moveFocus } from './keyboard';
import { Problems } from './problems';
import { readSaved, type Folds } from './saved';
import { reduce, Requests, type PageState } from './state';

export function LookPage({ host }: { readonly host: Host<ToLookPage, FromLookPage> }): JSX.Element {
  const [state, setState] = useState<PageState>();
  const [saved] = useState(() => readSaved(host.saved()));
  const [open, setOpenSets] = useState<Readonly<Record<Folds, ReadonlySet<string>>>>(() => ({
    collapsed: new Set(saved.collapsed),
    params: new Set(saved.params),
    details: new Set(saved.details),
    asText: new Set(saved.asText),
  }));
  const [views] = useState(() => new Views(saved.views));
  const [requests] = useState(() => new Requests());
  const [said, setSaid] = useState('');
  const reveal = useRef<string>();

  useEffect(() => {
    host.listen((message) => {
      if (message.type === 'reveal') reveal.current = message.id;
      setState((before) => {
        const after = reduce(before, message, requests);
        const words = announcement(before?.look, after?.look);
        if (words !== undefined) setSaid(words);
        return after;
      });
    });
    host.post({ type: 'ready', width: plotWidth() });
  }, [host, requests]);

  useEffect(() => {
    const keep = (): void =>
      host.save({
        version: 1,
        scroll: window.scrollY,
        collapsed: [...open.collapsed],
        params: [...open.params],
        details: [...open.details],
        asText: [...open.asText],
        views: views.save(),
      });
    let timer: ReturnType<typeof setTimeout> | undefined;
    const soon = (): void => {
      clearTimeout(timer);
      timer = setTimeout(keep, 200);
    };
    soon();
    window.addEventListener('scroll', soon, { passive: true });
    const off = views.onChange(soon);
    return () => {
      clearTimeout(timer);
      window.removeEventListener('scroll', soon);
      off();
    };
  }, [host, open, views]);

  const isThere = state !== undefined;
  useEffect(() => {
    if (isThere) window.scrollTo(0, saved.scroll);
  }, [isThere, saved]);
  useEffect(() => {
    const id = reveal.current;
    const card =
      id === undefined ? null : document.querySelector<HTMLElement>(`[data-card="${CSS.escape(id)}"]`);
    if (!card) return;
    reveal.current = undefined;
    card.scrollIntoView({ block: 'nearest' });
    card.focus();
  }, [state]);

  useEffect(() => {
    const listener = (e: KeyboardEvent): void => moveFocus(e);
    window.addEventListener('keydown', listener);
    return () => window.removeEventListener('keydown', listener);
  }, []);

  const steps = useMemo(() => new Map(state?.look.steps.map((s) => [s.id, s])), [state?.look.steps]);
  const names = state?.look.names;
  const context = useMemo<LookContext>(
    () => ({
      post: (message) => host.post(message),
      copy: (text, what) => host.post({ type: 'copy', text, what }),
      views,
      requests,
      steps,
      names: names ?? [],
      isOpen: (fold, key) => open[fold].has(key),
      setOpen: (fold, key, on) =>
        setOpenSets((before) => {
          const set = new Set(before[fold]);
          if (on) set.add(key);
          else set.delete(key);
          return { ...before, [fold]: set };
        }),
    }),
    [host, views, requests, steps, names, open],
  );

  return (
    <Look.Provider value={context}>
      <main data-view="look" data-ready={isThere}>
        {state && (
          <>
            <LookHeader look={state.look} />
            <Problems problems={state.look.problems} />
            <ol class="cards">
              {state.look.cards.map((c, i) => (
                <li key={c.id}>
                  <CardSection view={c} redrawn={state.redrawn} index={i} count={state.look.cards.length} />
                </li>
              ))}
            </ol>
            <AddStep addable={state.look.addable} />
          </>
        )}
        <div class="spoken" role="status" aria-live="polite">
          {said}
        </div>
      </main>
    </Look.Provider>
  );
}
