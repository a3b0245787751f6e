/** What a run of the editor suites is told by scripts/test-editor.mjs; all paths are absolute. */
export interface RunOptions {
  /** The repository (package.json, dist/). */
  readonly root: string;
  /** Folder in which scripts/editor-setup.mjs put the editor's server. */
  readonly serverDir: string;
  /** Program file of a Chromium. */
  readonly chromium: string;
  /** The packaged extension: what users install is what is tested. */
  readonly vsix: string;
  /** Throw-away folder of this run: profile, workspace, logs. */
  readonly runDir: string;
  /** The bundled extension-host suite. */
  readonly hostSuite: string;
  /** Where screenshots and logs of failures are kept. */
  readonly outDir: string;
  /** Only suites or tests whose name holds this text; empty for all. */
  readonly filter: string;
}

/** Patience for a state of the workbench: a loaded machine is three times slower than an idle one. */
export const STATE_TIMEOUT = 90_000;

/** Awaits until the probe gives something other than undefined or false; its errors count as "not yet". */
export async function until<T>(
  what: string,
  probe: () => Promise<T | undefined | false> | T | undefined | false,
  timeout = STATE_TIMEOUT,
): Promise<T> {
  const end = Date.now() + timeout;
  let last: unknown;
  for (;;) {
    try {
      const found = await probe();
      if (found !== undefined && found !== false) return found;
    } catch (error) {
      last = error;
    }
    if (Date.now() > end) throw new Error(`waited ${timeout / 1000} s in vain for: ${what}`, { cause: last });
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}
