/** JSON with keys in order, so that equal values give equal text. BigInt and GPS times are kept as they are. */
export function stableJson(value: unknown): string {
  if (value === null || typeof value !== 'object')
    return value === undefined ? 'undefined' : JSON.stringify(value);
  if (Array.isArray(value)) return `[${value.map(stableJson).join(',')}]`;
  const entries = Object.entries(value).filter(([, v]) => v !== undefined);
  entries.sort(([a], [b]) => (a < b ? -1 : 1));
  return `{${entries.map(([k, v]) => `${JSON.stringify(k)}:${stableJson(v)}`).join(',')}}`;
}

/** Incremental SHA-256, given by the host. */
export interface Hasher {
  update(bytes: Uint8Array): void;
  /** Lower-case hex; ends the hasher. */
  digest(): string;
}

export function fingerprint(hasher: Hasher, parts: readonly unknown[]): string {
  // Text of stableJson is ASCII apart from names; UTF-16 code units are enough to tell two of them apart.
  const text = stableJson(parts);
  const bytes = new Uint8Array(text.length * 2);
  for (let i = 0; i < text.length; i++) {
    const c = text.charCodeAt(i);
    bytes[2 * i] = c & 255;
    bytes[2 * i + 1] = c >> 8;
  }
  hasher.update(bytes);
  return hasher.digest();
}
