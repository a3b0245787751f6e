// The few parts of WebAssembly used here. src/core has no DOM and no Node types, so they are declared locally.

/** A compiled module (`WebAssembly.Module`). It can be posted to workers, which instantiate it without compiling. */
export type WasmModule = object;

export interface WasmMemory {
  readonly buffer: ArrayBuffer;
  grow(pages: number): number;
}

interface WasmApi {
  Module: new (bytes: Uint8Array) => WasmModule;
  Memory: new (limits: { initial: number; maximum: number }) => WasmMemory;
  Instance: new (module: WasmModule, imports: object) => { exports: unknown };
  validate(bytes: Uint8Array): boolean;
}

const api = (): WasmApi | undefined => (globalThis as { WebAssembly?: WasmApi }).WebAssembly;

/**
 * Compiles the bytes of `kernels.wasm`, once per process. Returns undefined where WebAssembly or its 128-bit vectors
 * are not available; the kernels then run in plain TypeScript.
 */
export function compileKernels(bytes: Uint8Array): WasmModule | undefined {
  const wasm = api();
  return wasm?.validate(bytes) ? new wasm.Module(bytes) : undefined;
}

type Address = number;

/** Functions of src/wasm/index.ts that exist once per element type: suffix 64 or 32. */
export interface TypedExports {
  planBytes(n: number): number;
  scratchBytes(n: number): number;
  planInit(plan: Address, n: number, scratch: Address): void;
  transform(plan: Address, xr: Address, xi: Address, yr: Address, yi: Address, scratch: Address): void;
  realPlanBytes(n: number): number;
  realScratchBytes(n: number): number;
  realPlanInit(plan: Address, n: number, scratch: Address): void;
  realForward(plan: Address, x: Address, yr: Address, yi: Address, scratch: Address): void;
  realBackward(plan: Address, xr: Address, xi: Address, y: Address, scratch: Address): void;
  multiply(n: number, ar: Address, ai: Address, br: Address, bi: Address, or: Address, oi: Address): void;
  multiplyConj(n: number, ar: Address, ai: Address, br: Address, bi: Address, or: Address, oi: Address): void;
  windowed(
    n: number,
    m: number,
    xr: Address,
    xi: Address,
    w: Address,
    factor: number,
    or: Address,
    oi: Address,
  ): void;
  energy(n: number, r: Address, i: Address, out: Address): number;
  peak(n: number, r: Address, i: Address): number;
}

/** Functions of src/wasm/index.ts in double only. */
export interface CommonExports {
  heapBase(): number;
  largest(): number;
  taper(n: number, x: Address, w: Address, centre: number, out: Address): number;
  power(n: number, r: Address, i: Address, out: Address): void;
  addPower(n: number, r: Address, i: Address, out: Address): void;
  addCross(n: number, ar: Address, ai: Address, br: Address, bi: Address, cr: Address, ci: Address): void;
  addMagnitude(n: number, count: number, r: Address, i: Address, mean: Address, spread: Address): void;
  medians(rows: Address, stride: number, count: number, columns: number, work: Address, out: Address): void;
  cascade(x: Address, n: number, step: number, sections: number, c: Address, z: Address): void;
  cascadePlain(x: Address, n: number, step: number, sections: number, c: Address, z: Address): void;
}

export interface WasmInstance {
  memory: WasmMemory;
  common: CommonExports;
  typed: { f64: TypedExports; f32: TypedExports };
}

function withSuffix(exports: Record<string, unknown>, suffix: string): TypedExports {
  const named = Object.entries(exports).filter(([name]) => name.endsWith(suffix));
  return Object.fromEntries(named.map(([name, f]) => [name.slice(0, -2), f])) as unknown as TypedExports;
}

/** A fresh instance with its own memory (up to 4 GiB). Throws when called where WebAssembly is missing. */
export function instantiate(module: WasmModule): WasmInstance {
  const wasm = api();
  if (!wasm) throw new Error('this JavaScript engine has no WebAssembly');
  const memory = new wasm.Memory({ initial: 16, maximum: 65536 });
  const abort = (): never => {
    throw new Error('a kernel aborted');
  };
  const { exports } = new wasm.Instance(module, { env: { memory, abort } });
  const all = exports as Record<string, unknown>;
  return {
    memory,
    common: all as unknown as CommonExports,
    typed: { f64: withSuffix(all, '64'), f32: withSuffix(all, '32') },
  };
}
