import { UserError } from '../data/errors';
import { startsWith } from './bytes';
import { rankChannels } from './channel-choice';
import { factsFrom } from './facts';
import type { ByteSource, ChannelFacts, Format } from './format';
import { Inflated } from './inflated';
import { openChannels, type ReadableChannel } from './open-channels';
import { findDialect, numericShare, type Dialect } from './text-dialect';
import { indexText, type TextIndex } from './text-index';
import { columnReader } from './text-read';
import { findTimeColumn } from './text-time';
import { fitTrack, readOnGrid, type TimeFit } from './time-axis';

const HEAD = 1 << 16;
const GZIP = '\x1f\x8b';

/**
 * Columns of numbers as text, plain or gzipped. The file is gone through once when it is opened: rows are counted, every
 * 1024th is noted, and the time column, when there is one, gives rate, start and gaps.
 */
export const textFormat: Format = {
  id: 'text',
  title: 'Text columns',
  extensions: ['csv', 'tsv', 'txt', 'asc', 'csv.gz', 'tsv.gz', 'txt.gz', 'asc.gz'],
  recognise(head, name) {
    if (startsWith(head, GZIP)) return 2;
    const byName = /\.(csv|tsv|txt|asc)(\.gz)?$/i.test(name) ? 1 : 0;
    if (head.includes(0)) return head[0] === 0xff || head[0] === 0xfe ? byName : 0;
    const { rows, lines } = numericShare(head, false);
    return rows >= 2 && rows >= lines / 2 ? 2 : byName;
  },
  open(access) {
    const packed = access.bytes();
    try {
      const gzip = startsWith(packed.read(0, 2), GZIP);
      const source = gzip
        ? new Inflated(packed, access.name, { kind: 'gzip', offset: 0, end: packed.size })
        : packed;
      const head = source.read(0, HEAD);
      refuseOther(head, access.name);
      const dialect = findDialect(head, head.length < HEAD, access.name);
      const time = findTimeColumn(dialect, access.name);
      const index = indexText(source, dialect, time);
      const fit: TimeFit | undefined = time && index.track ? fitTrack(index.track, time) : undefined;
      const notes = [...dialect.notes, ...(time?.notes ?? []), ...(fit?.notes ?? [])];
      const channels = dialect.columns.flatMap((_, k) =>
        k === time?.column ? [] : [columnChannel(source, dialect, index, k, fit, notes, gzip)],
      );
      return openChannels(
        {
          format: gzip ? `${textFormat.title}, gzip` : textFormat.title,
          name: access.name,
          size: access.size,
          tree: {
            name: access.name,
            path: '',
            kind: 'group',
            detail: `${index.rows} rows`,
            attributes: dialect.clues.map(
              (c) => [c.name, typeof c.value === 'string' ? c.value : ''] as const,
            ),
            children: dialect.columns.map((c, k) => ({
              name: c.name,
              path: c.name,
              kind: 'dataset' as const,
              detail: k === time?.column ? 'time' : (c.unit ?? ''),
              attributes: [],
              children: [],
              ...(k === time?.column ? {} : { channel: c.name }),
            })),
          },
          close: () => packed.close(),
        },
        rankChannels(channels),
      );
    } catch (e) {
      packed.close();
      throw e;
    }
  },
};

function columnChannel(
  source: ByteSource,
  dialect: Dialect,
  index: TextIndex,
  column: number,
  fit: TimeFit | undefined,
  notes: readonly string[],
  gzip: boolean,
): ReadableChannel {
  const { name, unit, header } = dialect.columns[column];
  const grid = fit?.grid;
  const length = grid?.length ?? index.rows;
  const own =
    unit === undefined ? [] : [{ name: 'unit', value: unit, where: `header "${header}"`, distance: 0 }];
  const found = factsFrom([...own, ...dialect.clues], { name, length }, fit);
  const facts: ChannelFacts = {
    name,
    type: 'text',
    shape: [index.rows, dialect.columns.length],
    length,
    ...(found.rate ? { rate: found.rate } : {}),
    ...(found.start ? { start: found.start } : {}),
    ...(found.unit ? { unit: found.unit } : {}),
    ...(grid ? { runs: grid.runs } : {}),
    layout: {
      kind: 'column',
      column,
      delimiter: dialect.delimiter,
      decimalComma: dialect.decimalComma,
      firstLine: dialect.dataLine,
      newline: dialect.newline,
      gzip,
    },
    notes: [...found.notes, ...notes],
  };
  const rows = columnReader(source, dialect, index, column);
  return { facts, read: grid ? readOnGrid(grid, rows) : rows };
}

/** What was compressed may be another format, which must be read by offset in its own file. */
function refuseOther(head: Uint8Array, name: string): void {
  if (!head.subarray(0, 1024).includes(0) || head[0] === 0xff || head[0] === 0xfe) return;
  throw new UserError(
    'not-text',
    `${name} holds binary data, not text. If it is compressed, unpack it first.`,
    name,
  );
}
