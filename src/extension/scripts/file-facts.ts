import { basename } from 'node:path';
import * as vscode from 'vscode';
import { formatGps, utcText } from '../../core/data/gps-time';
import { numberText } from '../../core/figures/number-text';
import type { ChannelFacts } from '../../core/formats/format';
import type { FileDescription } from '../../core/protocol/engine';

const MOST_CHANNELS = 6;

/** What a file holds, as lines of plain text: they may carry names from the file, so they are never taken for markup. */
export function factLines({ file, format, size, channels }: FileDescription): string[] {
  const lines = [
    `${basename(file)}: ${format}, ${bytes(size)}, ${channels.length} channel${channels.length === 1 ? '' : 's'}`,
  ];
  lines.push(...channels.slice(0, MOST_CHANNELS).map(channelLine));
  if (channels.length > MOST_CHANNELS) lines.push(`and ${channels.length - MOST_CHANNELS} more`);
  return lines;
}

export function channelLine({ name, type, length, rate, start, unit }: ChannelFacts): string {
  const parts = [
    rate
      ? `${numberText(length / rate.value, 7)} s at ${numberText(rate.value, 9)} Hz`
      : `${length} samples, rate not stated`,
    start ? `from GPS ${formatGps(start.value)} (${utcText(start.value)})` : 'start not stated',
    type,
    ...(unit ? [unit.value] : []),
  ];
  return `${name}: ${parts.join(', ')}`;
}

function bytes(size: number): string {
  const step = size <= 0 ? 0 : Math.min(4, Math.floor(Math.log10(size) / 3));
  return `${numberText(size / 1000 ** step, 3)} ${['bytes', 'kB', 'MB', 'GB', 'TB'][step]}`;
}

/** Link that runs a command of ours with plain data. */
export function commandLink(label: string, command: string, ...args: readonly unknown[]): string {
  return `[${label}](command:${command}?${encodeURIComponent(JSON.stringify(args))})`;
}

/** Markdown in which only these commands may be run by a click. */
export function trustedMarkdown(...commands: readonly string[]): vscode.MarkdownString {
  const text = new vscode.MarkdownString('', true);
  text.isTrusted = { enabledCommands: commands };
  return text;
}
