import { UserError } from '../data/errors';
import { hint, nearestNames } from '../data/nearest';
import type { ChannelFacts, FileNode, OpenFile } from './format';

/** A channel and the function that reads its samples `[from, to)`. */
export interface ReadableChannel {
  readonly facts: ChannelFacts;
  readonly read: (from: number, to: number, into: Float64Array) => void;
}

/** Builds an OpenFile; range and name checks are made here once for all formats. */
export function openChannels(
  file: { format: string; name: string; size: number; tree: FileNode; close: () => void },
  channels: readonly ReadableChannel[],
): OpenFile {
  const byName = new Map(channels.map((c) => [c.facts.name, c]));
  let open = true;
  return {
    format: file.format,
    name: file.name,
    size: file.size,
    tree: file.tree,
    channels: channels.map((c) => c.facts),
    read(channel, from, to, into) {
      if (!open) throw new Error(`${file.name} was closed and is read again`);
      const c = byName.get(channel);
      if (!c) throw unknownChannel(file.name, channel, [...byName.keys()]);
      if (from < 0 || to > c.facts.length || to < from || into.length < to - from)
        throw new RangeError(`samples ${from} to ${to} of ${channel}, which has ${c.facts.length}`);
      if (to > from) c.read(from, to, into);
    },
    close() {
      if (open) file.close();
      open = false;
    },
  };
}

function unknownChannel(file: string, channel: string, known: readonly string[]): UserError {
  const near = hint(nearestNames(channel, known));
  const listed = known.slice(0, 8).map((k) => `"${k}"`);
  const has = listed.length > 0 ? ` It has ${listed.join(', ')}.` : ' It has no channel at all.';
  return new UserError('channel-unknown', `${file} has no channel "${channel}".${near || has}`, file);
}
