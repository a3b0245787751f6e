/** Builds dist/kernels.wasm if it is missing or out of date; returns its path. */
export function buildWasm(): Promise<string>;
