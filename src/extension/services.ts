import type * as vscode from 'vscode';
import type { EngineService } from './engine-service';
import type { RecentRuns } from './recipes/recent-runs';

/** What every part of the extension shares. */
export interface Services {
  readonly engine: EngineService;
  readonly log: vscode.LogOutputChannel;
  /** What was run lately in this workspace. */
  readonly recent: RecentRuns;
  /** Folder of the bundled pages. */
  readonly dist: vscode.Uri;
}
