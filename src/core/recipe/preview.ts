import { UserError } from '../data/errors';
import { gpsTime } from '../data/gps-time';
import type { Series } from '../data/kinds';
import { emptyEnvelope, foldEnvelope, keepEnvelope } from '../figures/envelope';
import type { Figure } from '../figures/figure';
import { seriesFigure } from '../figures/series';
import type { OpenFile } from '../formats/format';
import type { PreviewRequest } from '../protocol/engine';

const BLOCK = 1 << 18;

/** Picture of a whole channel before any look exists: smallest and largest sample per pixel column, read block by block. */
export async function previewFigure(
  file: OpenFile,
  request: PreviewRequest,
  block: (fraction: number) => Promise<void>,
): Promise<Figure> {
  const channel = file.channels.find((c) => c.name === request.channel);
  if (!channel)
    throw new UserError('no-channel', `${file.name} has no channel "${request.channel}"`, file.name);
  const rate = request.rate ?? channel.rate?.value;
  const series: Series = {
    kind: 'series',
    label: channel.name,
    channel: channel.name,
    unit: channel.unit?.value ?? '',
    // Without a rate the axis counts samples, and its label says so.
    rate: rate ?? 1,
    start: channel.start?.value ?? gpsTime(0),
    length: channel.length,
    valid: channel.runs ?? [{ from: 0, to: channel.length }],
    read: (from, to, into = new Float64Array(to - from)) => {
      file.read(channel.name, from, to, into);
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
  const figure = seriesFigure(series, request.viewport, { id: 'preview', title: channel.name });
  if (rate !== undefined) return figure;
  return { ...figure, x: { ...figure.x, label: 'Sample number (no sample rate found)', unit: '' } };
}
