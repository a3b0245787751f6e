import type { JSX } from 'preact';
import { useEffect, useState } from 'preact/hooks';
import type { FileDescription } from '../../src/core/protocol/engine';
import type { DataState, FromDataPage, ToDataPage } from '../../src/core/protocol/panel';
import { Views, type SavedViews } from '../figure/views';
import type { Host } from '../page/host';
import { bytesText, numberText } from '../../src/core/figures/shown-number';
import { ChannelView } from './channel-view';
import { Tree } from './tree';

type DataHost = Host<ToDataPage, FromDataPage>;

interface Saved {
  readonly channel?: string;
  readonly views?: SavedViews;
  readonly scroll?: number;
}

/** What is in a data file: its facts, its tree, and one channel with a preview. */
export function DataPage({ host }: { readonly host: DataHost }): JSX.Element {
  const [state, setState] = useState<DataState>();
  const [saved] = useState(() => (host.saved() ?? {}) as Saved);
  const [chosen, setChosen] = useState(saved.channel);
  const [views] = useState(() => new Views(saved.views));
  useEffect(() => {
    host.listen((m) => {
      if (m.type === 'data') setState(m.state);
      else window.dispatchEvent(new CustomEvent('preview', { detail: m }));
    });
    host.post({ type: 'ready' });
  }, [host]);
  useEffect(() => {
    const keep = (): void =>
      host.save({
        ...(chosen === undefined ? {} : { channel: chosen }),
        views: views.save(),
        scroll: window.scrollY,
      } satisfies Saved);
    keep();
    window.addEventListener('scroll', keep, { passive: true });
    const off = views.onChange(keep);
    return () => {
      window.removeEventListener('scroll', keep);
      off();
    };
  }, [host, chosen, views]);
  const isThere = state !== undefined;
  useEffect(() => {
    if (isThere) window.scrollTo(0, saved.scroll ?? 0);
  }, [isThere, saved]);

  return (
    <main data-view="data" data-ready={isThere}>
      {state && (
        <>
          <header class="look-head">
            <div class="title-line">
              <h1>{state.name}</h1>
              {state.description && <Facts description={state.description} />}
            </div>
          </header>
          {state.error && (
            <div class="failure" role="alert" data-code={state.error.code}>
              <p>{state.error.message}</p>
            </div>
          )}
          {state.description && (
            <Contents
              description={state.description}
              chosen={chosen}
              onChoose={setChosen}
              host={host}
              views={views}
            />
          )}
        </>
      )}
    </main>
  );
}

function Facts({ description: d }: { readonly description: FileDescription }): JSX.Element {
  return (
    <span class="muted">
      {d.format}, {bytesText(d.size)}, {numberText(d.channels.length)}{' '}
      {d.channels.length === 1 ? 'channel' : 'channels'}
    </span>
  );
}

interface ContentsProps {
  readonly description: FileDescription;
  readonly chosen: string | undefined;
  readonly onChoose: (channel: string) => void;
  readonly host: DataHost;
  readonly views: Views;
}

function Contents({ description, chosen, onChoose, host, views }: ContentsProps): JSX.Element {
  const channel = description.channels.find((c) => c.name === chosen) ?? description.channels.at(0);
  return (
    <div class="contents">
      <nav class="tree" aria-label="Contents of the file">
        <Tree description={description} chosen={channel?.name} onChoose={onChoose} />
      </nav>
      {channel ? (
        <ChannelView key={channel.name} channel={channel} host={host} views={views} />
      ) : (
        <p class="failure">
          Nothing in this file is a series of samples: no dataset, column or track with 16 or more numbers
          along one axis was found.
        </p>
      )}
    </div>
  );
}
