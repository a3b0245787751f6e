import * as vscode from 'vscode';

/** What is remembered of a run: enough to find it again, no data. */
export interface RecentRun {
  readonly path: string;
  /** Milliseconds since 1970, when it ended. */
  readonly at: number;
  readonly steps: number;
  readonly done: number;
  readonly warnings: number;
}

const KEY = 'recentRuns';
const KEPT = 20;

/** The last run of each of the recipes run in this workspace, newest first. */
export class RecentRuns implements vscode.Disposable {
  readonly #memory: vscode.Memento;
  readonly #changed = new vscode.EventEmitter<void>();
  readonly onDidChange = this.#changed.event;

  constructor(memory: vscode.Memento) {
    this.#memory = memory;
  }

  all(): readonly RecentRun[] {
    return this.#memory.get<readonly RecentRun[]>(KEY, []);
  }

  add(run: RecentRun): void {
    const others = this.all().filter((r) => r.path !== run.path);
    void this.#memory.update(KEY, [run, ...others].slice(0, KEPT));
    this.#changed.fire();
  }

  dispose(): void {
    this.#changed.dispose();
  }
}
