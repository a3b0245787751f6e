import { checkParam } from '../../src/core/protocol/param-check';
import type { ParamSpec } from '../../src/core/protocol/panel';

/** What a field's text means: a value for the recipe (undefined takes the key out, so the default holds), or what is wrong. */
export type FieldReading =
  { readonly ok: true; readonly value: unknown } | { readonly ok: false; readonly message: string };

/** Value as text in a field and in tables: a list's groups are parted by semicolons, a time shows as decimal GPS. */
export function valueText(value: unknown, each = 1): string {
  if (value === null || value === undefined) return '';
  if (Array.isArray(value)) {
    const flat = value.flat() as unknown[];
    const groups: string[] = [];
    for (let i = 0; i < flat.length; i += each)
      groups.push(
        flat
          .slice(i, i + each)
          .map(String)
          .join(', '),
      );
    return groups.join(each > 1 ? '; ' : ', ');
  }
  if (typeof value === 'object' && 'seconds' in value && 'nanos' in value) {
    const { seconds, nanos } = value as { seconds: number; nanos: number };
    const fraction = String(nanos).padStart(9, '0').replace(/0+$/, '');
    return fraction === '' ? String(seconds) : `${seconds}.${fraction}`;
  }
  return typeof value === 'string' ? value : JSON.stringify(value);
}

export function fieldText(param: ParamSpec, value: unknown): string {
  return valueText(value, param.kind === 'list' ? param.each : 1);
}

/** Default as words, or nothing when there is none to speak of. */
export function defaultWords(param: ParamSpec): string {
  if (param.default === null) return 'automatic';
  const text = fieldText(param, param.default);
  return text === '' ? 'none' : `${text}${unitOf(param) === '' ? '' : ` ${unitOf(param)}`}`;
}

export function unitOf(param: ParamSpec): string {
  return 'unit' in param ? param.unit : '';
}

/** Allowed values as words: "above 0 Hz, at most 2048 Hz". */
export function boundsWords(param: ParamSpec): string {
  if (param.kind !== 'number' && param.kind !== 'list') return '';
  const unit = param.unit === '' ? '' : ` ${param.unit}`;
  const above = param.kind === 'number' && param.exclusiveMin === true;
  return [
    param.min === undefined ? '' : `${above ? 'above' : 'at least'} ${param.min}${unit}`,
    param.max === undefined ? '' : `at most ${param.max}${unit}`,
    param.kind === 'number' && param.integer === true ? 'whole' : '',
    param.kind === 'list' && param.each > 1 ? `groups of ${param.each}, parted by semicolons` : '',
  ]
    .filter((t) => t !== '')
    .join(', ');
}

/** Reads a text field. An empty one means the default. */
export function readField(param: ParamSpec, text: string): FieldReading {
  const trimmed = text.trim();
  if (trimmed === '') return { ok: true, value: undefined };
  const raw = rawValue(param, trimmed);
  if (typeof raw === 'number' && Number.isNaN(raw))
    return { ok: false, message: `"${trimmed}" is not a number` };
  const check = checkParam(param, raw);
  return check.ok ? { ok: true, value: raw } : { ok: false, message: check.message };
}

function rawValue(param: ParamSpec, text: string): unknown {
  switch (param.kind) {
    case 'number':
      return Number(text);
    case 'list':
      return text
        .split(/[;,\s]+/)
        .filter((t) => t !== '')
        .map(Number);
    default:
      return text;
  }
}

/**
 * Range of a slider: the parameter's bounds, and where one is missing (or 0 on a logarithmic slider) a factor of 32
 * beside the default. Undefined when there is nothing to go by.
 */
export function sliderBounds(param: ParamSpec): { readonly min: number; readonly max: number } | undefined {
  if (param.kind !== 'number' || param.slider === undefined) return undefined;
  const log = param.slider === 'log';
  const around = param.default === null || !(param.default > 0) ? undefined : param.default;
  const floor = param.min === undefined || (log && param.min <= 0) ? undefined : param.min;
  const min = floor ?? (around === undefined ? undefined : around / 32);
  const max = param.max ?? (around === undefined ? undefined : around * 32);
  return min === undefined || max === undefined || !(max > min) ? undefined : { min, max };
}

/** Place of a slider's knob from 0 to 1, and back; a logarithmic one needs bounds above 0. */
export function sliderPlace(value: number, min: number, max: number, scale: 'linear' | 'log'): number {
  const at = scale === 'log' ? Math.log(value / min) / Math.log(max / min) : (value - min) / (max - min);
  return Math.max(0, Math.min(1, at));
}

export function sliderValue(place: number, min: number, max: number, scale: 'linear' | 'log'): number {
  if (place <= 0) return min;
  if (place >= 1) return max;
  const v = scale === 'log' ? min * (max / min) ** place : min + (max - min) * place;
  return Number(v.toPrecision(3));
}
