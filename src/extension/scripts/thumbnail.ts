import * as vscode from 'vscode';
import { formatGps } from '../../core/data/gps-time';
import { figureSvg } from '../../core/figures/svg/figure-svg';
import type { FileDescription } from '../../core/protocol/engine';
import type { Services } from '../services';

/** A hover must be quick and say so: the spectrum of the first part of the file. */
const SECONDS = 64;
const SAMPLES = 1 << 20;
const SIZE = { width: 420, height: 180 } as const;

/** The noise spectrum of the first channel with a rate as a picture in Markdown, with a line on what it is of. */
export async function thumbnail(
  { file, channels }: FileDescription,
  services: Services,
  token: vscode.CancellationToken,
): Promise<string | undefined> {
  const channel = channels.find((c) => c.rate !== undefined);
  if (!channel?.rate) return undefined;
  const rate = channel.rate.value;
  const duration = Math.min(SECONDS, SAMPLES / rate, channel.length / rate);
  const recipe = {
    fringe: 1,
    inputs: {
      data: {
        file,
        channel: channel.name,
        ...(channel.start ? { start: formatGps(channel.start.value) } : {}),
        ...(channel.start ? { duration } : {}),
      },
    },
    steps: [{ id: 'noise', do: 'noise-spectrum', of: ['data'], segment: Math.min(4, duration / 4) }],
  };
  // Without a start there is no span to name, and the whole file may be long.
  if (!channel.start && channel.length > SAMPLES) return undefined;
  const abort = new AbortController();
  token.onCancellationRequested(() => abort.abort());
  const result = await services.engine.api.run(
    { text: JSON.stringify(recipe), folder: '/', viewport: { width: SIZE.width } },
    { signal: abort.signal, onEvent: () => undefined },
  );
  const card = result.cards.find((c) => c.id === 'noise');
  const figure = card?.figures.find((f) => f.traces.some((t) => t.type === 'line'));
  if (!figure) return undefined;
  const dark = [vscode.ColorThemeKind.Dark, vscode.ColorThemeKind.HighContrast].includes(
    vscode.window.activeColorTheme.kind,
  );
  const svg = figureSvg(figure, { ...SIZE, style: dark ? 'dark' : 'light', bare: true });
  const data = Buffer.from(svg).toString('base64');
  return `![Noise spectrum](data:image/svg+xml;base64,${data})\n\nAmplitude spectral density in ${figure.y.unit || 'no stated unit'} against Hz, one-sided, of the first ${Number(duration.toPrecision(4))} s`;
}
