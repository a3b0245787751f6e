/** Keeps the most recently used values while their sizes stay under a limit. */
export class ByteCache<V> {
  readonly #limit: number;
  readonly #entries = new Map<string, { value: V; bytes: number }>();
  #bytes = 0;

  constructor(limit: number) {
    this.#limit = limit;
  }

  get(key: string): V | undefined {
    const entry = this.#entries.get(key);
    if (!entry) return undefined;
    this.#entries.delete(key);
    this.#entries.set(key, entry);
    return entry.value;
  }

  /** A value larger than the whole limit is kept alone, so that it can at least be drawn. */
  set(key: string, value: V, bytes: number): void {
    this.delete(key);
    this.#entries.set(key, { value, bytes });
    this.#bytes += bytes;
    for (const [oldest] of this.#entries) {
      if (this.#bytes <= this.#limit || oldest === key) break;
      this.delete(oldest);
    }
  }

  delete(key: string): void {
    const entry = this.#entries.get(key);
    if (!entry) return;
    this.#entries.delete(key);
    this.#bytes -= entry.bytes;
  }

  get bytes(): number {
    return this.#bytes;
  }
}

/** Bytes of all typed arrays reachable from plain data; closures (a file's reader) count nothing. */
export function bytesOf(value: unknown, seen = new Set<unknown>()): number {
  if (value === null || typeof value !== 'object' || seen.has(value)) return 0;
  seen.add(value);
  if (ArrayBuffer.isView(value)) return value.byteLength;
  if (value instanceof ArrayBuffer) return value.byteLength;
  let sum = 0;
  for (const v of Array.isArray(value) ? value : Object.values(value)) sum += bytesOf(v, seen);
  return sum;
}
