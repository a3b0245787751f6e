import { UserError } from '../data/errors';
import type { GpsTime } from '../data/gps-time';
import { hint, nearestNames } from '../data/nearest';
import { readInstant } from './instant';
import { SAMPLE_BYTES, type NumberType } from './samples';

/** What the sidecar of raw samples says. */
export interface Sidecar {
  readonly type: NumberType;
  readonly littleEndian: boolean;
  /** Bytes before the first sample. */
  readonly offset: number;
  readonly rate?: number;
  readonly start?: { readonly time: GpsTime; readonly how: string };
  readonly unit?: string;
  /** Names of interleaved channels; absent for one. */
  readonly channels?: readonly string[];
}

export const SIDECAR_EXAMPLE =
  '{ "type": "float64", "byteOrder": "little", "rate": 4096, "start": "1400000000", "unit": "strain", "channels": ["alder"], "offset": 0 }';

const KEYS = ['type', 'byteOrder', 'rate', 'start', 'unit', 'channels', 'offset'] as const;

/** Reads and checks the JSON text; a UserError says which key is wrong and what it may be. */
export function parseSidecar(text: string, name: string): Sidecar {
  let json: unknown;
  try {
    json = JSON.parse(text);
  } catch (e) {
    throw wrong(name, `it is not JSON (${e instanceof Error ? e.message : String(e)})`);
  }
  if (typeof json !== 'object' || json === null || Array.isArray(json))
    throw wrong(name, 'it is not an object');
  const it = json as Readonly<Record<string, unknown>>;
  for (const key of Object.keys(it))
    if (!KEYS.some((k) => k === key))
      throw wrong(name, `there is no key "${key}".${hint(nearestNames(key, KEYS))}`);
  const types = Object.keys(SAMPLE_BYTES);
  if (typeof it['type'] !== 'string' || !types.includes(it['type']))
    throw wrong(name, `"type" must be one of ${types.join(', ')}`);
  const order = it['byteOrder'] ?? 'little';
  if (order !== 'little' && order !== 'big') throw wrong(name, '"byteOrder" must be "little" or "big"');
  const offset = it['offset'] ?? 0;
  if (typeof offset !== 'number' || !Number.isSafeInteger(offset) || offset < 0)
    throw wrong(name, '"offset" must be a whole number of bytes');
  const { rate, unit } = it;
  if (rate !== undefined && !(typeof rate === 'number' && rate > 0 && Number.isFinite(rate)))
    throw wrong(name, '"rate" must be a positive number of Hz');
  if (unit !== undefined && typeof unit !== 'string') throw wrong(name, '"unit" must be a text');
  const start = startOf(it['start'], name);
  const channels = channelsOf(it['channels'], name);
  return {
    type: it['type'] as NumberType,
    littleEndian: order === 'little',
    offset,
    ...(rate === undefined ? {} : { rate: rate }),
    ...(unit === undefined ? {} : { unit }),
    ...(start ? { start } : {}),
    ...(channels ? { channels } : {}),
  };
}

function startOf(value: unknown, name: string): Sidecar['start'] {
  if (value === undefined) return undefined;
  if (typeof value === 'string' || typeof value === 'number') {
    // A sidecar is written for this program, so its number is GPS unless it is a date.
    const read = readInstant(value, /^\s*\d{4}-/.test(String(value)) ? 'utc' : 'gps');
    if ('time' in read) return read;
  }
  throw wrong(
    name,
    '"start" must be GPS seconds (number or text) or a UTC date such as "2024-05-18T16:53:02Z"',
  );
}

function channelsOf(value: unknown, name: string): readonly string[] | undefined {
  if (value === undefined) return undefined;
  if (typeof value === 'number' && Number.isInteger(value) && value >= 1 && value <= 4096)
    return Array.from({ length: value }, (_, i) => `channel ${i + 1}`);
  const list = Array.isArray(value) ? (value as unknown[]) : [];
  const texts = list.filter((v): v is string => typeof v === 'string' && v !== '');
  if (list.length === 0 || texts.length !== list.length || new Set(texts).size !== texts.length)
    throw wrong(name, '"channels" must be a number or a list of different names');
  return texts;
}

function wrong(name: string, why: string): UserError {
  return new UserError('sidecar-wrong', `${name}: ${why}. A whole sidecar: ${SIDECAR_EXAMPLE}`, name);
}
