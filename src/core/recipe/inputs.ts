import { UserError } from '../data/errors';
import {
  addSamples,
  formatGps,
  gpsTime,
  isPastLeapTable,
  parseGps,
  secondsBetween,
  type GpsTime,
} from '../data/gps-time';
import type { Series } from '../data/kinds';
import { hint, nearestNames } from '../data/nearest';
import { scanSamples, type SampleScan } from '../data/scan';
import { complementSpans, cropSpans } from '../data/spans';
import type { ChannelFacts, OpenFile } from '../formats/format';
import type { InputProvenance } from '../protocol/engine';
import type { EngineHost } from './engine-host';
import { fingerprint } from './fingerprint';
import type { InputSpec } from './recipe';

/** Files kept open at a time; reopening is cheap, running out of handles is not. */
const OPEN_FILES = 16;
const SCANS = 64;

export interface PreparedInput {
  readonly series: Series;
  readonly fingerprint: string;
  readonly provenance: InputProvenance;
  readonly spec: InputSpec;
  readonly facts: ChannelFacts;
  /** Sample of the channel that is the first of the series. */
  readonly from: number;
}

/** Opens data files and turns a recipe's inputs into series, scanning each span once. */
export class InputReader {
  readonly #host: EngineHost;
  readonly #files = new Map<string, { stamp: string; file: OpenFile }>();
  readonly #scans = new Map<string, SampleScan>();

  constructor(host: EngineHost) {
    this.#host = host;
  }

  /** The open file; opened anew when it has changed on disk. */
  open(path: string): OpenFile {
    const stamp = this.#host.stamp(path);
    const known = this.#files.get(path);
    if (known?.stamp === stamp) {
      this.#files.delete(path);
      this.#files.set(path, known);
      return known.file;
    }
    known?.file.close();
    this.#files.delete(path);
    const file = this.#host.open(path);
    this.#files.set(path, { stamp, file });
    for (const [oldest, entry] of this.#files) {
      if (this.#files.size <= OPEN_FILES) break;
      entry.file.close();
      this.#files.delete(oldest);
    }
    return file;
  }

  async prepare(
    name: string,
    spec: InputSpec,
    folder: string,
    block: (fraction: number) => Promise<void>,
  ): Promise<PreparedInput> {
    const path = this.#host.resolve(folder, spec.file);
    const file = this.open(path);
    const channel = pickChannel(file, spec);
    const { rate, rateFrom } = rateOf(file, channel, spec);
    const { start: epoch, startFrom, startKnown } = epochOf(channel, spec);
    const { from, to } = spanOf(file, channel, spec, rate, epoch);
    const print = fingerprint(this.#host.hasher(), [
      this.#host.stamp(path),
      { ...spec, channel: channel.name },
    ]);

    const scale = spec.scale ?? 1;
    // A file is read through the reader again at each use, so that a changed or closed file is noticed and reopened.
    const read = (a: number, b: number, into = new Float64Array(b - a)): Float64Array => {
      const view = into.length === b - a ? into : into.subarray(0, b - a);
      this.open(path).read(channel.name, from + a, from + b, view);
      if (scale !== 1) for (let i = 0; i < view.length; i++) view[i] *= scale;
      return view;
    };
    const length = to - from;
    let scan = this.#scans.get(print);
    if (!scan) {
      const runs = channel.runs && cropSpans(channel.runs, from, to);
      scan = await scanSamples(read, length, {
        rate,
        hasher: this.#host.hasher(),
        block,
        ...(runs ? { runs } : {}),
      });
      if (this.#scans.size >= SCANS) this.#scans.delete(this.#scans.keys().next().value!);
      this.#scans.set(print, scan);
    }
    const start = addSamples(epoch, from, rate);
    const series: Series = {
      kind: 'series',
      label: `${name} (${spec.file} ${channel.name})`,
      channel: name,
      unit: spec.unit ?? channel.unit?.value ?? '',
      rate,
      start,
      ...(startKnown ? {} : { startUnknown: true }),
      length,
      valid: scan.valid,
      scan,
      read,
    };
    const provenance: InputProvenance = {
      name,
      file: spec.file,
      format: file.format,
      channel: channel.name,
      unit: series.unit,
      rate,
      rateFrom,
      start: formatGps(start),
      startFrom,
      startKnown,
      samples: length,
      duration: length / rate,
      sha256: scan.sha256,
      notFinite: scan.stats.notFinite,
      gaps: complementSpans(scan.valid, length).map((g) => ({
        start: formatGps(addSamples(start, g.from, rate)),
        seconds: (g.to - g.from) / rate,
      })),
    };
    return { series, fingerprint: print, provenance, spec, facts: channel, from };
  }
}

function pickChannel(file: OpenFile, spec: InputSpec): ChannelFacts {
  const names = file.channels.map((c) => c.name);
  if (spec.channel === undefined) {
    if (file.channels.length === 1) return file.channels[0];
    if (names.length === 0)
      throw new UserError(
        'no-channel',
        `${file.name} holds nothing that can be read as a series of samples`,
        file.name,
      );
    throw new UserError(
      'no-channel',
      `${file.name} has ${names.length} channels; name one as "channel": ${names.slice(0, 6).join(', ')}`,
      file.name,
    );
  }
  const channel = file.channels.find((c) => c.name === spec.channel);
  if (channel) return channel;
  const near =
    hint(nearestNames(spec.channel, names)) || ` It has: ${names.slice(0, 6).join(', ') || 'none'}.`;
  throw new UserError('no-channel', `${file.name} has no channel "${spec.channel}".${near}`, file.name);
}

function rateOf(file: OpenFile, channel: ChannelFacts, spec: InputSpec): { rate: number; rateFrom: string } {
  if (spec.rate !== undefined) return { rate: spec.rate, rateFrom: 'given in the recipe' };
  if (channel.rate) return { rate: channel.rate.value, rateFrom: channel.rate.where };
  throw new UserError(
    'needs-rate',
    `${file.name} does not say the sample rate of ${channel.name}; give "rate" in Hz in the recipe's input`,
    file.name,
  );
}

/** A channel without a start time counts from zero, and says so. */
function epochOf(
  channel: ChannelFacts,
  spec: InputSpec,
): { start: GpsTime; startFrom: string; startKnown: boolean } {
  if (spec.epoch !== undefined)
    return { start: parseGps(spec.epoch), startFrom: 'given in the recipe', startKnown: true };
  if (channel.start) {
    const late = isPastLeapTable(channel.start.value) ? '; later than the leap-second table knows' : '';
    return { start: channel.start.value, startFrom: channel.start.where + late, startKnown: true };
  }
  return { start: gpsTime(0), startFrom: 'not in the file: counted from GPS 0', startKnown: false };
}

/** Sample indices `[from, to)` of the span the recipe asks for. */
function spanOf(
  file: OpenFile,
  channel: ChannelFacts,
  spec: InputSpec,
  rate: number,
  epoch: GpsTime,
): { from: number; to: number } {
  const covers = `${file.name} ${channel.name} covers GPS ${formatGps(epoch)} to ${formatGps(addSamples(epoch, channel.length, rate))}`;
  // A start between two samples means the first sample not before it; 1e-6 of a sample is rounding, not intent.
  const offset = spec.start === undefined ? 0 : secondsBetween(parseGps(spec.start), epoch) * rate;
  const from = Math.ceil(offset - 1e-6);
  if (from < 0 || from >= channel.length)
    throw new UserError('outside', `"start" ${String(spec.start)} is outside the data: ${covers}`, file.name);
  if (spec.duration === undefined) return { from, to: channel.length };
  const count = Math.round(spec.duration * rate);
  if (count < 1)
    throw new UserError(
      'outside',
      `"duration" ${spec.duration} s is shorter than one sample at ${rate} Hz`,
      file.name,
    );
  if (from + count > channel.length)
    throw new UserError(
      'outside',
      `"duration" ${spec.duration} s reaches past the end: ${covers}`,
      file.name,
    );
  return { from, to: from + count };
}
