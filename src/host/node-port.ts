import type { MessagePort, Worker } from 'node:worker_threads';
import type { Port } from '../core/protocol/rpc';

/** A worker's port, seen from either side, as the port that rpc.ts speaks through. */
export function nodePort(port: MessagePort | Worker): Port {
  return {
    post: (message) => port.postMessage(message),
    onMessage: (handler) => {
      port.on('message', handler);
    },
  };
}
