import { basename } from 'node:path';
import * as vscode from 'vscode';
import { parseGps, secondsBetween } from '../../core/data/gps-time';
import type { ChannelFacts } from '../../core/formats/format';
import { openLook } from '../start-look';
import { DATA_ENDINGS } from '../data-endings';
import type { Services } from '../services';
import { channelLine } from './file-facts';
import { filesNamedIn } from './named-files';

/** Seconds shown on each side of the time. */
const AROUND = 16;
/** Files of a workspace that are asked, nearest names first; more would make the command slow on an archive. */
const MOST_FILES = 100;

interface Holder {
  readonly file: string;
  readonly channel: ChannelFacts;
  /** Seconds after the first sample. */
  readonly at: number;
  readonly duration: number;
}

/**
 * Starts a look around a GPS time on the channels that hold it: first of the files that the document names, else of the
 * workspace. Asks when there is more than one.
 */
export async function lookAt(gps: string, document: string | undefined, services: Services): Promise<void> {
  const named = await namedFiles(document);
  const holders = await holdersOf(gps, named, services);
  if (holders.length === 0) {
    const all = await vscode.workspace.findFiles(
      `**/*.{${DATA_ENDINGS.join(',')}}`,
      '**/{node_modules,.*}/**',
      MOST_FILES,
    );
    const others = all.filter((uri) => !named.some((n) => n.fsPath === uri.fsPath));
    holders.push(...(await holdersOf(gps, others, services)));
  }
  const found = await choose(gps, holders);
  if (!found) return;
  const span = [Math.max(0, found.at - AROUND), Math.min(found.duration, found.at + AROUND)] as const;
  await openLook([{ file: found.file, channel: found.channel, answers: {}, span }], services);
}

async function namedFiles(document: string | undefined): Promise<vscode.Uri[]> {
  if (document === undefined) return [];
  return filesNamedIn(await vscode.workspace.openTextDocument(vscode.Uri.parse(document)));
}

async function holdersOf(gps: string, files: readonly vscode.Uri[], services: Services): Promise<Holder[]> {
  const time = parseGps(gps);
  const found: Holder[] = [];
  for (const uri of files) {
    let channels: readonly ChannelFacts[];
    try {
      ({ channels } = await services.engine.api.describe({ file: uri.fsPath }));
    } catch {
      continue; // not a data file after all
    }
    for (const channel of channels) {
      if (!channel.start || !channel.rate) continue;
      const at = secondsBetween(time, channel.start.value);
      const duration = channel.length / channel.rate.value;
      if (at >= 0 && at < duration) found.push({ file: uri.fsPath, channel, at, duration });
    }
  }
  return found;
}

async function choose(gps: string, holders: readonly Holder[]): Promise<Holder | undefined> {
  if (holders.length === 0) {
    void vscode.window.showInformationMessage(
      `No data file that this document names or this workspace holds says that it covers GPS ${gps}. Start a look on the file you mean.`,
    );
    return undefined;
  }
  if (holders.length === 1) return holders[0];
  const picked = await vscode.window.showQuickPick(
    holders.map((holder) => ({
      label: basename(holder.file),
      description: holder.channel.name,
      detail: channelLine(holder.channel),
      holder,
    })),
    { title: `Look at GPS ${gps}`, placeHolder: 'Which channel do you want to look at?' },
  );
  return picked?.holder;
}
