import type { GpsTime } from '../data/gps-time';
import type { Span } from '../data/spans';

/** Bytes of a file by offset. Synchronous: readers run in a worker, never in the editor's own process or in a page. */
export interface ByteSource {
  /** Name to use in messages. */
  readonly name: string;
  readonly size: number;
  /** Bytes `[offset, offset + length)`; fewer only where the file ends. */
  read(offset: number, length: number): Uint8Array;
  close(): void;
}

/** A fact together with where it was found, for example "attribute Spacing of /strain". */
export interface Found<T> {
  readonly value: T;
  readonly where: string;
}

export type SampleType =
  | 'float64'
  | 'float32'
  | 'float16'
  | 'int8'
  | 'int16'
  | 'int24'
  | 'int32'
  | 'int64'
  | 'uint8'
  | 'uint16'
  | 'uint32'
  | 'uint64'
  | 'text';

/** A dataset, column or track that can be read as an evenly sampled series. */
export interface ChannelFacts {
  /** Name by which a recipe refers to it, unique in the file: "/strain", "column 2", "track 1". */
  readonly name: string;
  readonly type: SampleType;
  /** Shape of the dataset it is taken from. */
  readonly shape: readonly number[];
  /** Number of samples. */
  readonly length: number;
  /** Hz; absent when nothing in the file says so, then the user is asked. */
  readonly rate?: Found<number>;
  /** Time of sample 0; absent when the file does not say. */
  readonly start?: Found<GpsTime>;
  readonly unit?: Found<string>;
  /** Runs of samples that exist in time order without holes, when the file tells (a time column with jumps). Absent means one run. */
  readonly runs?: readonly Span[];
  /** Where its samples lie, for formats whose name and shape do not tell; what an exported script reads them by. */
  readonly layout?: ChannelLayout;
  /** Things the user should know: scale of an integer type, a fit of the time column, a guess. */
  readonly notes: readonly string[];
}

export type ChannelLayout =
  /** Of interleaved tracks, from 0. */
  | { readonly kind: 'track'; readonly track: number }
  | {
      readonly kind: 'raw';
      readonly littleEndian: boolean;
      /** Bytes before the first sample. */
      readonly offset: number;
      readonly tracks: number;
      readonly track: number;
    }
  | {
      readonly kind: 'column';
      /** From 0. */
      readonly column: number;
      readonly delimiter: string;
      readonly decimalComma: boolean;
      /** 1-based line of the first numbers; code of the line end. */
      readonly firstLine: number;
      readonly newline: number;
      readonly gzip: boolean;
    };

/** A node of the file's tree as shown in the panel. */
export interface FileNode {
  readonly name: string;
  readonly path: string;
  readonly kind: 'group' | 'dataset' | 'other';
  readonly detail: string;
  readonly attributes: readonly (readonly [name: string, value: string])[];
  readonly channel?: string;
  readonly children: readonly FileNode[];
}

/** An open file. `read` is by span and never touches more than it must. */
export interface OpenFile {
  readonly format: string;
  readonly name: string;
  readonly size: number;
  readonly tree: FileNode;
  readonly channels: readonly ChannelFacts[];
  /**
   * Copies samples `[from, to)` of a channel into `into` as float64, without scaling or filling.
   * Throws a UserError that names file and place when the bytes are not what the header promised.
   */
  read(channel: string, from: number, to: number, into: Float64Array): void;
  close(): void;
}

/** One file format. New formats register here and nothing else changes. */
export interface Format {
  readonly id: string;
  readonly title: string;
  /** Lower-case endings without the dot; ".csv.gz" is "csv.gz". */
  readonly extensions: readonly string[];
  /** How sure the format is that these first bytes are its own: 0 no, 1 by name only, 2 by content. */
  recognise(head: Uint8Array, name: string): 0 | 1 | 2;
  open(source: FileAccess): OpenFile;
}

/** The file and its neighbours as the host offers them. */
export interface FileAccess {
  readonly path: string;
  readonly name: string;
  /** Bytes. */
  readonly size: number;
  /** Opens the bytes; each call gives a source of its own. */
  bytes(): ByteSource;
  /** Bytes of a file beside this one (a sidecar), or undefined when there is none. */
  sibling(name: string): ByteSource | undefined;
  /** Opens an HDF5 file through the host's library. */
  hdf5(): Hdf5File;
}

/** The small part of an HDF5 library the reader needs, so that the meaning of attributes is found in core and tested without files. */
export interface Hdf5File {
  readonly root: Hdf5Group;
  close(): void;
}

export interface Hdf5Group {
  readonly path: string;
  readonly attributes: readonly Hdf5Attribute[];
  readonly groups: readonly Hdf5Group[];
  readonly datasets: readonly Hdf5Dataset[];
  /** Links and objects that are neither, with a word on what they are. */
  readonly others: readonly { readonly path: string; readonly what: string }[];
}

export interface Hdf5Attribute {
  readonly name: string;
  readonly value: string | number | bigint | boolean | readonly (string | number | bigint)[];
}

export interface Hdf5Dataset {
  readonly path: string;
  readonly shape: readonly number[];
  /** Undefined when the stored type is not a plain number (compound, string, enum, reference…): `typeText` says what. */
  readonly type: SampleType | undefined;
  readonly typeText: string;
  readonly chunks: readonly number[] | undefined;
  readonly filters: readonly string[];
  readonly attributes: readonly Hdf5Attribute[];
  /** Things the host knows and the user should: parts that live in other files, for example. */
  readonly notes: readonly string[];
  /** Reads samples `[from, to)` along `axis`, converted to float64; the other axes stay at `at` (one entry per axis). */
  read(at: readonly number[], axis: number, from: number, to: number, into: Float64Array): void;
  /** Value of a scalar or small dataset (up to 64 elements); undefined when it is larger or of a type without text. */
  small(): string | number | bigint | boolean | readonly (string | number | bigint)[] | undefined;
}
