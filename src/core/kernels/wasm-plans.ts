import type { Precision } from './complex-arrays';
import type { Heap } from './heap';
import type { WasmInstance } from './wasm-module';

/** Tables beyond this many bytes are dropped, least recently used first. */
const CACHE_BYTES = 256 * 1048576;

/** A plan whose tables may be dropped and built again; `at` is their address, 0 while dropped. */
export interface WasmPlan {
  readonly length: number;
  readonly precision: Precision;
  readonly real: boolean;
  at: number;
  bytes: number;
  scratch: number;
  lastUse: number;
}

/** Transform tables in kernel memory, built on first use, and the scratch they share. */
export class WasmPlans {
  private readonly heap: Heap;
  private readonly typed: WasmInstance['typed'];
  private readonly known = new Map<string, WasmPlan>();
  private bytes = 0;
  private uses = 0;
  private scratchAt = 0;
  private scratchBytes = 0;

  constructor(instance: WasmInstance, heap: Heap) {
    this.heap = heap;
    this.typed = instance.typed;
  }

  /** The one plan of a length; nothing is built before it is used. */
  plan(length: number, precision: Precision, real: boolean): WasmPlan {
    const key = `${precision}${real ? ' real ' : ' '}${length}`;
    let plan = this.known.get(key);
    if (!plan) {
      plan = { length, precision, real, at: 0, bytes: 0, scratch: 0, lastUse: 0 };
      this.known.set(key, plan);
    }
    return plan;
  }

  /** Makes the tables and the scratch ready; returns the address of the scratch. Both hold until the next call. */
  ready(plan: WasmPlan): number {
    plan.lastUse = ++this.uses;
    if (plan.at === 0) this.build(plan);
    this.reserveScratch(plan.scratch);
    return this.scratchAt;
  }

  /** Drops all tables and the scratch. */
  clear(): void {
    for (const plan of this.built()) this.drop(plan);
    if (this.scratchAt) this.heap.release(this.scratchAt);
    this.scratchAt = 0;
    this.scratchBytes = 0;
  }

  private build(plan: WasmPlan): void {
    const { length, real } = plan;
    const f = this.typed[plan.precision];
    plan.bytes = (real ? f.realPlanBytes(length) : f.planBytes(length)) >>> 0;
    plan.scratch = (real ? f.realScratchBytes(length) : f.scratchBytes(length)) >>> 0;
    for (
      let held = this.built();
      held.length > 0 && this.bytes + plan.bytes > CACHE_BYTES;
      held = this.built()
    ) {
      this.drop(held.reduce((a, b) => (a.lastUse < b.lastUse ? a : b)));
    }
    this.reserveScratch(plan.scratch);
    plan.at = this.heap.alloc(plan.bytes);
    if (real) f.realPlanInit(plan.at, length, this.scratchAt);
    else f.planInit(plan.at, length, this.scratchAt);
    this.bytes += plan.bytes;
  }

  private built(): WasmPlan[] {
    return [...this.known.values()].filter((p) => p.at !== 0);
  }

  private drop(plan: WasmPlan): void {
    this.heap.release(plan.at);
    plan.at = 0;
    this.bytes -= plan.bytes;
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
