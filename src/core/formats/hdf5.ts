import { factsFrom, type Clue, type SeriesFacts } from './facts';
import { startsWith } from './bytes';
import type { ChannelFacts, Format, Hdf5Attribute, Hdf5Dataset, Hdf5Group } from './format';
import { leafName, treeOf } from './hdf5-tree';
import { meaningOf } from './meaning';
import { openChannels, type ReadableChannel } from './open-channels';
import { channelAxes, channelIndexName, rankChannels, typeNotes } from './channel-choice';
import { fitStamps, readOnGrid, scaled, type TimeFit } from './time-axis';

const SIGNATURE = '\x89HDF\r\n\x1a\n';

interface Placed {
  readonly dataset: Hdf5Dataset;
  /** Groups from the one it is in up to the root. */
  readonly above: readonly Hdf5Group[];
}

/**
 * HDF5: every numeric dataset with one long axis is a channel (see channel-choice.ts). Rate, start and unit come from
 * the attributes of the dataset and of the groups above, from scalars beside, from scalars elsewhere, or from a time
 * dataset of the same length beside, in this order.
 */
export const hdf5Format: Format = {
  id: 'hdf5',
  title: 'HDF5',
  extensions: ['h5', 'hdf5', 'hdf', 'he5'],
  recognise(head, name) {
    // The signature may sit behind a user block of 512, 1024, 2048 … bytes.
    for (let at = 0; at < head.length; at = at === 0 ? 512 : at * 2)
      if (startsWith(head.subarray(at), SIGNATURE)) return 2;
    return /\.(h5|hdf5|hdf|he5)$/i.test(name) ? 1 : 0;
  },
  open(access) {
    const file = access.hdf5();
    try {
      const placed: Placed[] = [];
      collect(file.root, [], placed);
      const scalars = placed.filter((p) => p.dataset.shape.every((n) => n === 1));
      const fits = new Map<string, TimeFit>();
      const channels = placed.flatMap((p) => channelsOf(p, placed, scalars, fits));
      const ordered = rankChannels(channels);
      const first = new Map<string, string>();
      for (const c of channels) if (!first.has(c.path)) first.set(c.path, c.facts.name);
      return openChannels(
        {
          format: 'HDF5',
          name: access.name,
          size: access.size,
          tree: treeOf(file.root, (path) => first.get(path)),
          close: () => file.close(),
        },
        ordered,
      );
    } catch (e) {
      file.close();
      throw e;
    }
  },
};

function collect(group: Hdf5Group, above: readonly Hdf5Group[], out: Placed[]): void {
  const chain = [group, ...above];
  for (const dataset of group.datasets) out.push({ dataset, above: chain });
  for (const g of group.groups) collect(g, chain, out);
}

function channelsOf(
  placed: Placed,
  all: readonly Placed[],
  scalars: readonly Placed[],
  fits: Map<string, TimeFit>,
): (ReadableChannel & { path: string })[] {
  const { dataset } = placed;
  const axes = dataset.type === undefined || dataset.type === 'text' ? undefined : channelAxes(dataset.shape);
  if (!axes || dataset.type === undefined) return [];
  const fit = timeBeside(placed, all, axes.length, fits);
  const clues = cluesFor(placed, scalars);
  const type = dataset.type;
  return axes.indices.map((at) => {
    const name = dataset.path + channelIndexName(at, axes.axis);
    const found: SeriesFacts = factsFrom(
      clues,
      { name: leafName(dataset.path), length: axes.length, axis: axes.axis },
      fit,
    );
    const grid = fit?.grid;
    const facts: ChannelFacts = {
      name,
      type,
      shape: dataset.shape,
      length: grid?.length ?? axes.length,
      ...(found.rate ? { rate: found.rate } : {}),
      ...(found.start ? { start: found.start } : {}),
      ...(found.unit ? { unit: found.unit } : {}),
      ...(grid ? { runs: grid.runs } : {}),
      notes: [...found.notes, ...(fit?.notes ?? []), ...typeNotes(type), ...dataset.notes],
    };
    const rows = (from: number, to: number, into: Float64Array): void =>
      dataset.read(at, axes.axis, from, to, into);
    return { path: dataset.path, facts, read: grid ? readOnGrid(grid, rows) : rows };
  });
}

/** Fit of a 1-D dataset in the same group, of the same length, whose name means time. Each is fitted once. */
function timeBeside(
  placed: Placed,
  all: readonly Placed[],
  length: number,
  fits: Map<string, TimeFit>,
): TimeFit | undefined {
  for (const { dataset, above } of all) {
    if (above[0] !== placed.above[0] || dataset === placed.dataset) continue;
    if (dataset.shape.length !== 1 || dataset.shape[0] !== length || dataset.type === undefined) continue;
    const means = meaningOf(leafName(dataset.path));
    if (means?.meaning !== 'time-axis') continue;
    const known = fits.get(dataset.path);
    if (known) return known;
    const fit = fitStamps({
      count: length,
      where: `dataset ${dataset.path}`,
      read: scaled((from, to, into) => dataset.read([0], 0, from, to, into), means.factor),
      ...(means.scale ? { scale: means.scale } : {}),
    });
    fits.set(dataset.path, fit);
    return fit;
  }
  return undefined;
}

function cluesFor(placed: Placed, scalars: readonly Placed[]): Clue[] {
  const own = placed.dataset.attributes.map((a) => attributeClue(a, placed.dataset.path, 0));
  const above = placed.above.flatMap((g, i) => g.attributes.map((a) => attributeClue(a, g.path, i + 1)));
  const beside = scalars
    .filter((s) => s.dataset !== placed.dataset)
    .flatMap((s): Clue[] => {
      const up = placed.above.indexOf(s.above[0]);
      const value = meaningOf(leafName(s.dataset.path)) ? s.dataset.small() : undefined;
      if (value === undefined) return [];
      const distance = up >= 0 ? up + 1 : placed.above.length + 2;
      return [{ name: leafName(s.dataset.path), value, where: `dataset ${s.dataset.path}`, distance }];
    });
  return [...own, ...above, ...beside];
}

function attributeClue(a: Hdf5Attribute, path: string, distance: number): Clue {
  return { name: a.name, value: a.value, where: `attribute ${a.name} of ${path}`, distance };
}
