import type { EngineApi } from '../../core/protocol/engine';
import type { Call } from '../../core/protocol/engine';

/** Everything a command touches, so that tests run commands without a process. */
export interface World {
  /** Results. */
  out(text: string): void;
  /** Progress and errors. */
  err(text: string): void;
  /** True when progress may rewrite its line. */
  readonly progress: boolean;
  readonly columns: number;
  readonly cwd: string;
  /** Folder of the built program, for the report's script and style. */
  readonly dist: string;
  /** Starts the engine on first use: `steps` and `--help` need no readers or kernels. */
  engine(): Promise<EngineApi>;
  cancelled(): boolean;
}

/** A call for the engine that draws no events. */
export function quiet(world: World): Call<unknown> {
  return { event: () => undefined, cancelled: () => world.cancelled() };
}

/** What the program ends with; see README. */
export const EXIT = { ok: 0, differs: 1, user: 2, failed: 3, bug: 70, interrupted: 130 } as const;
