import type { WasmMemory } from './wasm-module';

const PAGE = 65536;
const GRAIN = 64;
const MIB = 1048576;

/**
 * Allocator over a growing WebAssembly memory: first fit in a list of free blocks sorted by address, neighbours
 * joined when freed. Blocks start on multiples of 64 bytes. Memory never shrinks (WebAssembly cannot), so it is
 * bounded by the largest amount in use at one time.
 */
export class Heap {
  private readonly memory: WasmMemory;
  private top: number;
  private readonly taken = new Map<number, number>();
  private readonly free: { at: number; bytes: number }[] = [];
  /** Bytes in use. */
  used = 0;

  constructor(memory: WasmMemory, base: number) {
    this.memory = memory;
    this.top = Math.ceil(base / GRAIN) * GRAIN;
  }

  /** Bytes of memory claimed from the system. */
  get reserved(): number {
    return this.memory.buffer.byteLength;
  }

  /** Address of a block of at least `bytes` bytes, not cleared. Throws RangeError when the memory cannot grow. */
  alloc(bytes: number): number {
    const need = Math.max(GRAIN, Math.ceil(bytes / GRAIN) * GRAIN);
    const at = this.fromFree(need) ?? this.fromTop(need);
    this.taken.set(at, need);
    this.used += need;
    return at;
  }

  /** Gives a block back; freeing an address twice, or one never given out, throws. */
  release(at: number): void {
    const bytes = this.taken.get(at);
    if (bytes === undefined) throw new Error(`kernel memory at ${at} is not in use: freed twice?`);
    this.taken.delete(at);
    this.used -= bytes;
    let i = 0;
    while (i < this.free.length && this.free[i].at < at) i++;
    this.free.splice(i, 0, { at, bytes });
    this.join(i);
    if (i > 0) this.join(i - 1);
    const last = this.free.at(-1);
    if (last && last.at + last.bytes === this.top) {
      this.top = last.at;
      this.free.pop();
    }
  }

  private join(i: number): void {
    if (i + 1 >= this.free.length) return;
    const a = this.free[i];
    const b = this.free[i + 1];
    if (a.at + a.bytes !== b.at) return;
    a.bytes += b.bytes;
    this.free.splice(i + 1, 1);
  }

  private fromFree(need: number): number | undefined {
    const i = this.free.findIndex((f) => f.bytes >= need);
    if (i < 0) return undefined;
    const block = this.free[i];
    const at = block.at;
    block.at += need;
    block.bytes -= need;
    if (block.bytes === 0) this.free.splice(i, 1);
    return at;
  }

  private fromTop(need: number): number {
    const at = this.top;
    const missing = at + need - this.memory.buffer.byteLength;
    if (missing > 0) {
      const mib = Math.ceil((at + need) / MIB);
      try {
        this.memory.grow(Math.ceil(missing / PAGE));
      } catch {
        throw new RangeError(
          `this calculation needs ${mib} MiB of kernel memory, which cannot be had (limit 4096 MiB): ` +
            'use a shorter span or shorter segments',
        );
      }
    }
    this.top = at + need;
    return at;
  }
}
