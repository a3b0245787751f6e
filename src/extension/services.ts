import type * as vscode from 'vscode';
import type { EngineService } from './engine-service';

/** What every part of the extension shares. */
export interface Services {
  readonly engine: EngineService;
  readonly log: vscode.LogOutputChannel;
  /** Folder of the bundled pages. */
  readonly dist: vscode.Uri;
}
