import { FS } from 'h5wasm/node';

interface Stream {
  stream_ops?: unknown;
  node?: unknown;
}

let collected: string | undefined;
let installed = false;

/**
 * The library prints why a call failed to standard error and returns only a negative number. From the first call on,
 * that text is kept instead of printed; the returned function ends the collection and gives it.
 * Letting the library throw from inside (it can) would leave handles open and its stack pointer displaced.
 */
export function captureMessages(): () => string {
  if (!installed) {
    const stream = (FS as unknown as { streams: (Stream | null)[] }).streams[2];
    if (stream) {
      stream.node ??= { mode: 0o20666 };
      stream.stream_ops = {
        write(_stream: unknown, buffer: Int8Array, offset: number, length: number): number {
          if (collected !== undefined && collected.length < 1 << 16)
            collected += Buffer.from(buffer.buffer, buffer.byteOffset + offset, length).toString('utf8');
          return length;
        },
      };
    }
    installed = true;
  }
  const outer = collected;
  collected = '';
  return () => {
    const text = collected ?? '';
    collected = outer;
    return text;
  };
}

/** Innermost reason in a printed error stack: "truncated file: eof = 500000, …". */
export function reasonOf(messages: string): string {
  const lines = messages.split('\n').flatMap((line) => {
    const m = /^\s*#\d+: .*? in [A-Za-z0-9_]+\(\): (.*)$/.exec(line);
    return m ? [m[1].trim()] : [];
  });
  return lines.at(-1)?.replace(/[.\s]+$/, '') ?? 'the library gives no reason';
}
