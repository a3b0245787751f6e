import { join } from 'node:path';
import { Worker } from 'node:worker_threads';
import type { EngineApi } from '../core/protocol/engine';
import { connect, type Client } from '../core/protocol/rpc';
import { nodePort } from './node-port';

/** Heap of the engine's thread; sample arrays live outside it. */
const HEAP_MB = 1024;

interface Live {
  readonly worker: Worker;
  readonly api: Client<EngineApi>;
  readonly close: (reason: Error) => void;
}

/**
 * The engine in its worker, kept alive: when the worker dies (out of memory, a trap in compiled code) every open call
 * fails with the reason and the next call starts a fresh one.
 */
export class EngineClient {
  readonly #dist: string;
  readonly #onDeath: (reason: Error) => void;
  #live: Live | undefined;
  #disposed = false;

  /** `dist` is the folder of worker.mjs. The worker starts at once, since loading it would be felt at the first look. */
  static start(dist: string, onDeath: (reason: Error) => void = () => undefined): EngineClient {
    const client = new EngineClient(dist, onDeath);
    client.#start();
    return client;
  }

  private constructor(dist: string, onDeath: (reason: Error) => void) {
    this.#dist = dist;
    this.#onDeath = onDeath;
  }

  get api(): Client<EngineApi> {
    return (this.#live ?? this.#start()).api;
  }

  #start(): Live {
    if (this.#disposed) throw new Error('the engine was shut down');
    const worker = new Worker(join(this.#dist, 'worker.mjs'), {
      resourceLimits: { maxOldGenerationSizeMb: HEAP_MB },
    });
    const { api, close } = connect<EngineApi>(nodePort(worker));
    const live: Live = { worker, api, close };
    const died = (reason: Error): void => {
      close(reason);
      if (this.#live !== live) return;
      this.#live = undefined;
      if (!this.#disposed) this.#onDeath(reason);
    };
    worker.on('error', (e) =>
      died(new Error(`the engine stopped: ${e.message}; it was started again`, { cause: e })),
    );
    worker.on('exit', (code) =>
      died(new Error(`the engine stopped with code ${code}; it was started again`)),
    );
    this.#live = live;
    return live;
  }

  async dispose(): Promise<void> {
    this.#disposed = true;
    await this.#live?.worker.terminate();
  }
}
