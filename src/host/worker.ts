import { parentPort } from 'node:worker_threads';
import { serve } from '../core/protocol/rpc';
import { Engine } from '../core/recipe/engine';
import { nodeHost } from './node-host';
import { nodePort } from './node-port';

// The engine in a thread of its own, so that neither the editor's process nor a page ever computes or reads files.
if (!parentPort) throw new Error('worker.mjs is started by the engine client, not by hand');
serve(nodePort(parentPort), new Engine(await nodeHost()));
