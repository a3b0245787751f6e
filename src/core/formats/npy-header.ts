import { UserError } from '../data/errors';
import { latin1, readExactly, startsWith, truncated, utf8, viewOf } from './bytes';
import type { ByteSource } from './format';
import type { NumberType } from './samples';

/** What the header of an array file says (format versions 1.0 to 3.0 of NumPy's NEP 1). */
export interface NpyHeader {
  /** Undefined for types that are not plain numbers; `descr` has the text. */
  readonly type: NumberType | undefined;
  readonly littleEndian: boolean;
  readonly descr: string;
  readonly fortran: boolean;
  readonly shape: readonly number[];
  readonly dataOffset: number;
  /** Bytes of one element, 0 when not known. */
  readonly itemSize: number;
}

export const NPY_MAGIC = '\x93NUMPY';
/** The largest header NumPy itself writes is a few kB; longer ones are damage. */
const LONGEST_HEADER = 1 << 20;

const TYPES: Readonly<Record<string, NumberType>> = {
  f8: 'float64',
  f4: 'float32',
  f2: 'float16',
  i1: 'int8',
  i2: 'int16',
  i4: 'int32',
  i8: 'int64',
  u1: 'uint8',
  u2: 'uint16',
  u4: 'uint32',
  u8: 'uint64',
  b1: 'uint8',
};

/** Reads and checks the header; a UserError names what is wrong when it is not one or promises more than the file holds. */
export function readNpyHeader(source: ByteSource): NpyHeader {
  const head = source.read(0, 12);
  if (head.length < 10) throw truncated(source.name, 10, head.length, 'the array header');
  if (!startsWith(head, NPY_MAGIC)) throw wrong(source.name, 'it does not begin with the NumPy signature');
  const version = head[6];
  if (version < 1 || version > 3) throw wrong(source.name, `version ${version} is not known`);
  const view = viewOf(head);
  const length = version === 1 ? view.getUint16(8, true) : view.getUint32(8, true);
  const at = version === 1 ? 10 : 12;
  if (length > LONGEST_HEADER) throw wrong(source.name, `a length of ${length} bytes cannot be right`);
  const bytes = readExactly(source, at, length, 'the array header');
  const text = version === 3 ? utf8(bytes) : latin1(bytes);
  const header = parseNpyHeader(text, at + length, source.name);
  if (header.itemSize > 0) {
    const needed = header.dataOffset + header.itemSize * header.shape.reduce((a, b) => a * b, 1);
    if (needed > source.size)
      throw truncated(
        source.name,
        needed,
        source.size,
        `the array (shape ${shapeText(header.shape)}, type ${header.descr})`,
      );
  }
  return header;
}

export function shapeText(shape: readonly number[]): string {
  return `(${shape.join(', ')}${shape.length === 1 ? ',' : ''})`;
}

/** Parses the dictionary text {'descr': '<f8', 'fortran_order': False, 'shape': (3, 4), }. */
function parseNpyHeader(text: string, dataOffset: number, name: string): NpyHeader {
  const descr =
    /['"]descr['"]\s*:\s*(?:['"]([^'"]*)['"]|(\[[\s\S]*?\])\s*,\s*['"](?:fortran_order|shape)['"])/.exec(
      text,
    );
  const fortran = /['"]fortran_order['"]\s*:\s*(True|False)/.exec(text);
  const shape = /['"]shape['"]\s*:\s*\(([^)]*)\)/.exec(text);
  if (!descr) throw wrong(name, 'it has no "descr" (the type of the numbers)');
  if (!fortran) throw wrong(name, 'it has no "fortran_order"');
  if (!shape) throw wrong(name, 'it has no "shape"');
  const sizes = shape[1]
    .split(',')
    .map((s) => s.trim().replace(/L$/, ''))
    .filter((s) => s !== '');
  if (!sizes.every((s) => /^\d{1,15}$/.test(s)))
    throw wrong(name, `its shape (${shape[1]}) is not a list of sizes`);
  const code = descr.at(1) ?? descr[2];
  const m = /^([<>|=]?)([fiub]\d+)$/.exec(code);
  const type = m ? TYPES[m[2]] : undefined;
  return {
    type,
    littleEndian: m?.[1] !== '>',
    descr: code,
    fortran: fortran[1] === 'True',
    shape: sizes.map(Number),
    dataOffset,
    itemSize: m && type ? Number(m[2].slice(1)) : 0,
  };
}

function wrong(name: string, why: string): UserError {
  return new UserError(
    'header-wrong',
    `${name} has a damaged array header: ${why}. Write the array again with numpy.save.`,
    name,
  );
}
