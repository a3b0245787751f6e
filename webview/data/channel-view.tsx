import type { JSX } from 'preact';
import { useEffect, useRef, useState } from 'preact/hooks';
import type { Figure, Viewport } from '../../src/core/figures/figure';
import type { CardError } from '../../src/core/protocol/engine';
import type { ChannelAnswers, FromDataPage, ToDataPage } from '../../src/core/protocol/panel';
import { FigureBox, plotWidth } from '../figure/figure-box';
import type { View } from '../figure/ranges';
import type { Views } from '../figure/views';
import type { Host } from '../page/host';
import { RateForm } from '../page/rate-form';
import { secondsText } from '../words/numbers';
import { channelFacts, type ChannelFacts } from './channel-words';

interface Props {
  readonly channel: ChannelFacts;
  readonly host: Host<ToDataPage, FromDataPage>;
  readonly views: Views;
}

/** One channel: its facts with their origin, a preview, and the way into a look. */
export function ChannelView({ channel, host, views }: Props): JSX.Element {
  const [answers, setAnswers] = useState<ChannelAnswers>({});
  const [asText, setAsText] = useState(false);
  const key = `preview/${channel.name}`;
  const { figure, error, fraction, ask } = usePreview(host, channel, answers.rate, views.of(key));
  const [, again] = useState(0);
  useEffect(() => views.onChange(() => again((n) => n + 1)), [views]);
  const needsRate = channel.rate === undefined && answers.rate === undefined;
  // Without a rate the preview counts samples, which are no span of time yet.
  const span = needsRate ? undefined : views.of(key).x;
  const start = (part?: readonly [number, number]): void =>
    host.post({ type: 'start-look', channel: channel.name, answers, ...(part ? { span: part } : {}) });

  return (
    <section class="channel-view" data-channel-view={channel.name} aria-label={channel.name}>
      <div class="title-line">
        <h2>{channel.name}</h2>
        <span class="push" />
        {span && (
          <button type="button" class="quiet" data-action="start-look-span" onClick={() => start(span)}>
            Start a look at the visible {secondsText(Number((span[1] - span[0]).toPrecision(3)))}
          </button>
        )}
        <button type="button" data-action="start-look" disabled={needsRate} onClick={() => start()}>
          Start a look
        </button>
      </div>
      <dl class="facts">
        {channelFacts(channel, answers).map((f) => (
          <div key={f.name} data-fact={f.name}>
            <dt>{f.name}</dt>
            <dd>
              {f.value}
              {f.where !== undefined && f.where !== '' && <span class="where">{f.where}</span>}
            </dd>
          </div>
        ))}
      </dl>
      {channel.notes.length > 0 && (
        <ul class="notes">
          {channel.notes.map((n) => (
            <li key={n}>{n}</li>
          ))}
        </ul>
      )}
      {channel.rate === undefined && (
        <div class="question">
          <p>
            The file does not say how fast <b>{channel.name}</b> was sampled. Your answer is used for the
            preview and written into the recipe; the file is not changed.
          </p>
          <RateForm button={needsRate ? 'Use this rate' : 'Change'} onAnswer={setAnswers} />
        </div>
      )}
      {error && (
        <div class="failure" role="alert" data-code={error.code}>
          <p>{error.message}</p>
        </div>
      )}
      {figure && (
        <FigureBox
          figure={figure}
          viewKey={key}
          views={views}
          result={String(answers.rate ?? '')}
          onViewport={ask}
          onCopy={(text, what) => host.post({ type: 'copy', text, what })}
          onLeave={() => undefined}
          asText={asText}
          onAsText={setAsText}
        />
      )}
      {!figure && !error && (
        <div class="plot-frame placeholder">
          <progress max={1} value={fraction} aria-label="Reading the channel" />
        </div>
      )}
    </section>
  );
}

interface Preview {
  readonly figure: Figure | undefined;
  readonly error: CardError | undefined;
  readonly fraction: number;
  readonly ask: (viewport: Viewport) => void;
}

let nextRequest = 1;

/** Asks for the preview and takes the newest answer alone. */
function usePreview(
  host: Props['host'],
  channel: ChannelFacts,
  rate: number | undefined,
  view: View,
): Preview {
  const [figure, setFigure] = useState<Figure>();
  const [error, setError] = useState<CardError>();
  const [fraction, setFraction] = useState(0);
  const last = useRef(0);
  const ask = (viewport: Viewport): void => {
    last.current = nextRequest++;
    host.post({
      type: 'preview',
      request: last.current,
      channel: channel.name,
      viewport,
      ...(rate === undefined ? {} : { rate }),
    });
  };
  useEffect(() => {
    const listener = (e: Event): void => {
      const m = (e as CustomEvent<Exclude<ToDataPage, { type: 'data' }>>).detail;
      if (m.request !== last.current) return;
      if (m.type === 'preview-progress') setFraction(m.fraction);
      else if (m.type === 'preview') {
        setFigure(m.figure);
        setError(undefined);
      } else setError(m.error);
    };
    window.addEventListener('preview', listener);
    return () => window.removeEventListener('preview', listener);
  }, []);
  useEffect(() => {
    ask({ width: plotWidth(), ...(view.x ? { x: view.x } : {}) });
  }, [channel, rate]);
  return { figure, error, fraction, ask };
}
