import type { Metadata } from 'h5wasm/node';
import type { Hdf5Attribute } from '../core/formats/format';
import type { NumberType } from '../core/formats/samples';

/** Class numbers of the HDF5 specification (H5T_class_t). */
const CLASS_TEXT = [
  'integer',
  'float',
  'time',
  'text',
  'bit field',
  'opaque',
  'compound',
  'reference',
  'enumeration',
  'variable-length list',
  'array',
];

/** The sample type of a plain number, undefined for everything else. */
export function numericType(meta: Metadata): NumberType | undefined {
  if (meta.type === 1) return ({ 8: 'float64', 4: 'float32', 2: 'float16' } as const)[meta.size as 8];
  if (meta.type !== 0) return undefined;
  const sizes = meta.signed
    ? ({ 1: 'int8', 2: 'int16', 4: 'int32', 8: 'int64' } as const)
    : ({ 1: 'uint8', 2: 'uint16', 4: 'uint32', 8: 'uint64' } as const);
  return sizes[meta.size as 8];
}

export function typeText(meta: Metadata): string {
  const plain = numericType(meta);
  if (plain) return plain;
  if (meta.type === 6 && meta.compound_type)
    return `compound (${meta.compound_type.members.map((m) => m.name).join(', ')})`;
  const bits = meta.type <= 1 ? ` of ${8 * meta.size} bits` : '';
  return `${CLASS_TEXT[meta.type] ?? 'unknown type'}${bits}`;
}

/** Value as the reader wants it: a scalar or a flat list; undefined for what has no plain value. */
export function plainValue(value: unknown): Hdf5Attribute['value'] | undefined {
  if (typeof value === 'string' || typeof value === 'number' || typeof value === 'bigint') return value;
  if (typeof value === 'boolean') return value;
  if (!Array.isArray(value) && !ArrayBuffer.isView(value)) return undefined;
  const list = [...(value as Iterable<unknown>)].flat(8);
  return list.every((v) => typeof v === 'string' || typeof v === 'number' || typeof v === 'bigint')
    ? list
    : undefined;
}
