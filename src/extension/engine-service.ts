import * as vscode from 'vscode';
import type { EngineApi, StepDescription } from '../core/protocol/engine';
import type { Client } from '../core/protocol/rpc';
import { EngineClient } from '../host/engine-client';

/** One engine for all looks and data views of the window; its worker is restarted by the client when it dies. */
export class EngineService implements vscode.Disposable {
  readonly #dist: string;
  readonly #log: vscode.LogOutputChannel;
  #client: EngineClient | undefined;
  #steps: Promise<readonly StepDescription[]> | undefined;

  constructor(dist: string, log: vscode.LogOutputChannel) {
    this.#dist = dist;
    this.#log = log;
  }

  get api(): Client<EngineApi> {
    this.#client ??= EngineClient.start(this.#dist, (reason) => this.#log.error(reason.message));
    return this.#client.api;
  }

  /** The steps there are; asked once, since they cannot change while the program runs. */
  steps(): Promise<readonly StepDescription[]> {
    this.#steps ??= this.api.steps({}).catch((e: unknown) => {
      this.#steps = undefined;
      throw e;
    });
    return this.#steps;
  }

  dispose(): void {
    void this.#client?.dispose();
  }
}
