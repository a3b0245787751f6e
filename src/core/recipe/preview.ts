import { UserError } from '../data/errors';
import { gpsTime } from '../data/gps-time';
import type { Series } from '../data/kinds';
import { emptyEnvelope, foldEnvelope, keepEnvelope } from '../figures/envelope';
import type { Figure, Viewport } from '../figures/figure';
import { seriesFigure } from '../figures/series';
import type { OpenFile } from '../formats/format';
import type { PreviewRequest } from '../protocol/engine';

const BLOCK = 1 << 18;

export interface Previewed {
  readonly series: Series;
  readonly rateKnown: boolean;
}

export type PreviewRead = (from: number, to: number, into: Float64Array) => void;

/** A whole channel as a series with its envelope, read once block by block, before any look exists. */
export async function previewSeries(
  file: OpenFile,
  request: PreviewRequest,
  read: PreviewRead,
  block: (fraction: number) => Promise<void>,
): Promise<Previewed> {
  const channel = file.channels.find((c) => c.name === request.channel);
  if (!channel)
    throw new UserError('no-channel', `${file.name} has no channel "${request.channel}"`, file.name);
  const series: Series = {
    kind: 'series',
    label: channel.name,
    channel: channel.name,
    unit: channel.unit?.value ?? '',
    // Without a rate the axis counts samples; previewFigure says so.
    rate: request.rate ?? channel.rate?.value ?? 1,
    start: channel.start?.value ?? gpsTime(0),
    ...(channel.start ? {} : { startUnknown: true }),
    length: channel.length,
    valid: channel.runs ?? [{ from: 0, to: channel.length }],
    read: (from, to, into = new Float64Array(to - from)) => {
      read(from, to, into);
      return into;
    },
  };
  const envelope = emptyEnvelope(series.length);
  const buffer = new Float64Array(Math.min(BLOCK, series.length));
  for (let from = 0; from < series.length; from += BLOCK) {
    await block(from / series.length);
    const to = Math.min(series.length, from + BLOCK);
    foldEnvelope(envelope, series.read(from, to, buffer.subarray(0, to - from)), to - from, from);
  }
  keepEnvelope(series, envelope);
  return { series, rateKnown: (request.rate ?? channel.rate) !== undefined };
}

/** Picture of a previewed channel: smallest and largest sample per pixel column of the viewport. */
export function previewFigure({ series, rateKnown }: Previewed, viewport: Viewport): Figure {
  const figure = seriesFigure(series, viewport, { id: 'preview', title: series.label });
  if (rateKnown) return figure;
  return { ...figure, x: { ...figure.x, label: 'Sample number (no sample rate found)', unit: '' } };
}
