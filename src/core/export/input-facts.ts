import { UserError } from '../data/errors';
import { formatGps } from '../data/gps-time';
import { channelAxes, channelIndexName } from '../formats/channel-choice';
import type { ChannelFacts } from '../formats/format';
import type { PreparedInput } from '../recipe/inputs';
import { spanLength } from '../data/spans';
import { pyFloat, pyGps, pyInt, pyString } from './literal';

/** One input for a script: its entry in INPUTS and the reader it needs. */
export interface ExportedInput {
  readonly reader: string;
  readonly lines: readonly string[];
}

/** Facts by which the script finds the samples again and knows that they are the same. */
export function exportedInput(name: string, input: PreparedInput): ExportedInput {
  const { facts, from, provenance, series, spec } = input;
  const place = placeOf(name, facts, provenance.format);
  const runs = facts.runs?.map((r) => `(${r.from}, ${r.to})`).join(', ');
  const unit = pyString(provenance.unit);
  return {
    reader: place.reader,
    lines: [
      `        "file": ${pyString(provenance.file)},`,
      `        "channel": ${pyString(facts.name)},`,
      ...place.lines.map((l) => `        ${l},`),
      `        "from_sample": ${pyInt(from)},`,
      `        "samples": ${pyInt(provenance.samples)},`,
      `        "rate_hz": ${pyFloat(provenance.rate)},  # ${provenance.rateFrom === 'given in the recipe' ? 'given in the recipe' : 'as the file says'}`,
      `        "start_gps": ${pyGps(series.start)},  # exactly ${formatGps(series.start)}${provenance.startKnown ? '' : ', unknown: counted from 0'}`,
      `        "unit": ${unit},`,
      `        "scale": ${pyFloat(spec.scale ?? 1)},`,
      `        "length": ${pyInt(facts.length)},`,
      `        "runs": ${runs === undefined ? 'None' : `[${runs}]`},`,
      `        "valid_samples": ${pyInt(spanLength(series.valid))},`,
      `        "sha256": "${provenance.sha256}",`,
    ],
  };
}

function placeOf(input: string, facts: ChannelFacts, format: string): ExportedInput {
  const layout = facts.layout;
  if (layout?.kind === 'track') return { reader: 'wav', lines: [`"track": ${pyInt(layout.track)}`] };
  if (layout?.kind === 'raw')
    return {
      reader: 'raw',
      lines: [
        `"dtype": "${facts.type}"`,
        `"little_endian": ${layout.littleEndian ? 'True' : 'False'}`,
        `"offset_bytes": ${pyInt(layout.offset)}`,
        `"tracks": ${pyInt(layout.tracks)}`,
        `"track": ${pyInt(layout.track)}`,
      ],
    };
  if (layout?.kind === 'column')
    return {
      reader: 'text',
      lines: [
        `"gzip": ${layout.gzip ? 'True' : 'False'}`,
        `"first_line": ${pyInt(layout.firstLine)}`,
        `"newline": ${pyString(String.fromCharCode(layout.newline))}`,
        `"delimiter": ${pyString(layout.delimiter)}`,
        `"decimal_comma": ${layout.decimalComma ? 'True' : 'False'}`,
        `"column": ${pyInt(layout.column)}`,
      ],
    };
  const axes = channelAxes(facts.shape);
  const at = axes?.indices.find((i) => facts.name.endsWith(channelIndexName(i, axes.axis)));
  if (!axes || !at)
    throw new UserError(
      'export-format',
      `input "${input}" is ${format}: there is no reader for it in Python`,
    );
  const path = facts.name.slice(0, facts.name.length - channelIndexName(at, axes.axis).length);
  const parts = at.map((i, a) => (a === axes.axis ? 'slice(None)' : String(i)));
  const index = `"index": (${parts.join(', ')}${parts.length === 1 ? ',' : ''})`;
  if (format === 'NumPy array') return { reader: 'npy', lines: [index] };
  if (format === 'NumPy archive') return { reader: 'npz', lines: [`"member": ${pyString(path)}`, index] };
  if (format === 'HDF5') return { reader: 'hdf5', lines: [`"dataset": ${pyString(path)}`, index] };
  throw new UserError('export-format', `input "${input}" is ${format}: there is no reader for it in Python`);
}
