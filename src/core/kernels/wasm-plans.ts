import type { Precision } from './complex-arrays';
import type { Heap } from './heap';
import type { TypedExports, WasmInstance } from './wasm-module';

/** Cached plans beyond this many bytes are dropped, least recently used first. */
const CACHE_BYTES = 256 * 1048576;

interface CachedPlan {
  at: number;
  bytes: number;
  scratch: number;
}

/** Transform tables in kernel memory, built on first use, and the scratch they share. */
export class WasmPlans {
  private readonly heap: Heap;
  private readonly typed: WasmInstance['typed'];
  private readonly cache = new Map<string, CachedPlan>();
  private cached = 0;
  private scratchAt = 0;
  private scratchBytes = 0;

  constructor(instance: WasmInstance, heap: Heap) {
    this.heap = heap;
    this.typed = instance.typed;
  }

  /** Address of the plan and of scratch large enough for it; both hold until the next call. */
  get(length: number, precision: Precision, real: boolean): { plan: number; scratch: number } {
    const key = `${precision}${real ? 'r' : 'c'}${length}`;
    let plan = this.cache.get(key);
    if (plan) this.cache.delete(key);
    else plan = this.build(length, this.typed[precision], real);
    this.cache.set(key, plan); // last in the map = most recently used
    this.reserveScratch(plan.scratch);
    return { plan: plan.at, scratch: this.scratchAt };
  }

  /** Drops all plans and the scratch. */
  clear(): void {
    for (const plan of this.cache.values()) this.heap.release(plan.at);
    this.cache.clear();
    this.cached = 0;
    if (this.scratchAt) this.heap.release(this.scratchAt);
    this.scratchAt = 0;
    this.scratchBytes = 0;
  }

  private build(length: number, f: TypedExports, real: boolean): CachedPlan {
    const bytes = (real ? f.realPlanBytes(length) : f.planBytes(length)) >>> 0;
    const scratch = (real ? f.realScratchBytes(length) : f.scratchBytes(length)) >>> 0;
    for (const [key, old] of this.cache) {
      if (this.cached + bytes <= CACHE_BYTES) break;
      this.heap.release(old.at);
      this.cache.delete(key);
      this.cached -= old.bytes;
    }
    this.reserveScratch(scratch);
    const at = this.heap.alloc(bytes);
    if (real) f.realPlanInit(at, length, this.scratchAt);
    else f.planInit(at, length, this.scratchAt);
    this.cached += bytes;
    return { at, bytes, scratch };
  }

  private reserveScratch(bytes: number): void {
    if (bytes <= this.scratchBytes) return;
    if (this.scratchAt) this.heap.release(this.scratchAt);
    this.scratchAt = 0;
    this.scratchBytes = 0;
    this.scratchAt = this.heap.alloc(bytes);
    this.scratchBytes = bytes;
  }
}
