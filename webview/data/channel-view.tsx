import type { JSX } from 'preact';
import { useEffect, useRef, useState } from 'preact/hooks';
import type { Figure, Viewport } from '../../src/core/figures/figure';
import type { CardError } from '../../src/core/protocol/engine';
import type { ChannelAnswers, FromDataPage, ToDataPage } from '../../src/core/protocol/panel';
import { FigureBox, plotWidth } from '../figure/figure-box';
import type { Views } from '../figure/views';
import type { Host } from '../page/host';
import { RateForm } from '../page/rate-form';
import { secondsText } from '../../src/core/figures/shown-number';
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
  const { whole, part, error, fraction, version, ask } = usePreview(host, channel, answers.rate);
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
          <RateForm
            button={needsRate ? 'Use this rate' : 'Change'}
            onAnswer={(said) => {
              // The axis changes from samples to seconds, so what was zoomed to no longer means the same.
              views.set(key, {});
              setAnswers(said);
            }}
          />
        </div>
      )}
      {error && (
        <div class="failure" role="alert" data-code={error.code}>
          <p>{error.message}</p>
        </div>
      )}
      {whole && (
        <FigureBox
          figure={whole}
          redrawn={part}
          viewKey={key}
          views={views}
          result={String(version)}
          onViewport={ask}
          onPicture={(svg) => host.post({ type: 'save-picture', name: 'preview', svg })}
          onCopy={(text, what) => host.post({ type: 'copy', text, what })}
          onLeave={() => undefined}
          asText={asText}
          onAsText={setAsText}
        />
      )}
      {!whole && !error && (
        <div class="plot-frame placeholder">
          <progress max={1} value={fraction} aria-label="Reading the channel" />
        </div>
      )}
    </section>
  );
}

interface Preview {
  /** The whole channel, and the part last zoomed to. */
  readonly whole: Figure | undefined;
  readonly part: Figure | undefined;
  readonly error: CardError | undefined;
  readonly fraction: number;
  /** Changes with every new picture of the whole. */
  readonly version: number;
  readonly ask: (viewport: Viewport) => void;
}

let nextRequest = 1;

/** Asks for the preview and takes the newest answer alone, for the whole and for a part of it. */
function usePreview(host: Props['host'], channel: ChannelFacts, rate: number | undefined): Preview {
  const [whole, setWhole] = useState<Figure>();
  const [part, setPart] = useState<Figure>();
  const [version, setVersion] = useState(0);
  const [error, setError] = useState<CardError>();
  const [fraction, setFraction] = useState(0);
  const last = useRef({ whole: 0, part: 0 });
  const ask = (viewport: Viewport): void => {
    const request = nextRequest++;
    last.current[viewport.x ? 'part' : 'whole'] = request;
    const said = rate === undefined ? {} : { rate };
    host.post({ type: 'preview', request, channel: channel.name, viewport, ...said });
  };
  useEffect(() => {
    const listener = (e: Event): void => {
      const m = (e as CustomEvent<Exclude<ToDataPage, { type: 'data' }>>).detail;
      const isWhole = m.request === last.current.whole;
      if (!isWhole && m.request !== last.current.part) return;
      if (m.type === 'preview-progress') setFraction(m.fraction);
      else if (m.type === 'preview-failed') setError(m.error);
      else {
        setError(undefined);
        if (isWhole) {
          setWhole(m.figure);
          setPart(undefined);
          setVersion((v) => v + 1);
        } else setPart(m.figure);
      }
    };
    window.addEventListener('preview', listener);
    return () => window.removeEventListener('preview', listener);
  }, []);
  useEffect(() => ask({ width: plotWidth() }), [channel, rate]);
  return { whole, part, error, fraction, version, ask };
}
