import { CancelledError, UserError } from '../data/errors';
import type { Call } from './engine';

/** Either end of a channel that carries structured-clonable messages: a worker thread's port, a page's, a pair in a test. */
export interface Port {
  post(message: unknown): void;
  onMessage(handler: (message: unknown) => void): void;
}

/** What an API may look like: async methods of one plain request and the call that carries events and cancel. */
// eslint-disable-next-line @typescript-eslint/no-explicit-any -- the only place where a method's own types are forgotten
export type Api<T> = { [K in keyof T]: (request: any, call: Call<any>) => Promise<unknown> };

type Method<T, K extends keyof T> = T[K] extends (request: infer Q, call: Call<infer E>) => Promise<infer R>
  ? (request: Q, options?: CallOptions<E>) => Promise<R>
  : never;

/** The caller's view of an API: same methods, with an event handler and an abort signal instead of the call. */
export type Client<T> = { readonly [K in keyof T]: Method<T, K> };

export interface CallOptions<E> {
  readonly onEvent?: (event: E) => void;
  readonly signal?: AbortSignalLike;
}

/** The part of AbortSignal used, so that core needs no DOM types. */
export interface AbortSignalLike {
  readonly aborted: boolean;
  addEventListener(type: 'abort', listener: () => void): void;
  removeEventListener(type: 'abort', listener: () => void): void;
}

interface ErrorOnWire {
  readonly name: string;
  readonly message: string;
  readonly code?: string;
  readonly where?: string;
  readonly stack?: string;
}

type ToServer =
  | {
      readonly t: 'call';
      readonly id: number;
      readonly method: string;
      readonly request: unknown;
      readonly flag?: SharedArrayBuffer;
    }
  | { readonly t: 'cancel'; readonly id: number };
type ToClient =
  | { readonly t: 'event'; readonly id: number; readonly event: unknown }
  | { readonly t: 'done'; readonly id: number; readonly result: unknown }
  | { readonly t: 'failed'; readonly id: number; readonly error: ErrorOnWire };

function toWire(e: unknown): ErrorOnWire {
  if (e instanceof UserError)
    return {
      name: e.name,
      message: e.message,
      code: e.code,
      ...(e.where === undefined ? {} : { where: e.where }),
    };
  if (e instanceof Error)
    return { name: e.name, message: e.message, ...(e.stack === undefined ? {} : { stack: e.stack }) };
  return { name: 'Error', message: String(e) };
}

function fromWire(e: ErrorOnWire): Error {
  if (e.name === 'UserError') return new UserError(e.code ?? 'unknown', e.message, e.where);
  if (e.name === 'CancelledError') return new CancelledError();
  const error = new Error(e.message);
  error.name = e.name;
  if (e.stack !== undefined) error.stack = e.stack;
  return error;
}

/** Answers calls that arrive on `port` with `api`'s methods. Every call ends: result, error or cancelled. */
export function serve<T extends Api<T>>(port: Port, api: T): void {
  const running = new Map<number, { cancelled: boolean }>();
  port.onMessage((raw) => {
    const message = raw as ToServer;
    if (message.t === 'cancel') {
      const call = running.get(message.id);
      if (call) call.cancelled = true;
      return;
    }
    const { id, method, request } = message;
    const state = { cancelled: false };
    // The shared flag is seen by a busy worker that never returns to its event loop; the message covers the rest.
    const flag = message.flag ? new Int32Array(message.flag) : undefined;
    running.set(id, state);
    const call: Call<unknown> = {
      event: (event) => port.post({ t: 'event', id, event } satisfies ToClient),
      cancelled: () => state.cancelled || (flag !== undefined && Atomics.load(flag, 0) !== 0),
    };
    const known =
      Object.hasOwn(api, method) || typeof (api as Record<string, unknown>)[method] === 'function';
    const answer = known
      ? Promise.resolve().then(() => api[method as keyof T](request, call))
      : Promise.reject(new Error(`no method "${method}"`));
    answer.then(
      (result) => {
        running.delete(id);
        port.post({ t: 'done', id, result } satisfies ToClient);
      },
      (error: unknown) => {
        running.delete(id);
        port.post({ t: 'failed', id, error: toWire(error) } satisfies ToClient);
      },
    );
  });
}

/** A caller for the API served at the other end of `port`. `close(reason)` fails every call that is still open. */
export function connect<T extends Api<T>>(
  port: Port,
): { readonly api: Client<T>; readonly close: (reason: Error) => void } {
  let next = 1;
  let closed: Error | undefined;
  const open = new Map<
    number,
    { resolve(v: unknown): void; reject(e: Error): void; event: ((e: unknown) => void) | undefined }
  >();
  port.onMessage((raw) => {
    const message = raw as ToClient;
    const call = open.get(message.id);
    if (!call) return;
    if (message.t === 'event') call.event?.(message.event);
    else {
      open.delete(message.id);
      if (message.t === 'done') call.resolve(message.result);
      else call.reject(fromWire(message.error));
    }
  });
  const invoke = (method: string, request: unknown, options: CallOptions<unknown> = {}): Promise<unknown> =>
    new Promise((resolve, reject) => {
      if (closed) {
        reject(closed);
        return;
      }
      if (options.signal?.aborted === true) {
        reject(new CancelledError());
        return;
      }
      const id = next++;
      const flag = typeof SharedArrayBuffer === 'undefined' ? undefined : new SharedArrayBuffer(4);
      const onAbort = (): void => {
        if (flag) Atomics.store(new Int32Array(flag), 0, 1);
        port.post({ t: 'cancel', id } satisfies ToServer);
      };
      const finish = (): void => options.signal?.removeEventListener('abort', onAbort);
      open.set(id, {
        resolve: (v) => {
          finish();
          resolve(v);
        },
        reject: (e) => {
          finish();
          reject(e);
        },
        event: options.onEvent,
      });
      options.signal?.addEventListener('abort', onAbort);
      port.post({ t: 'call', id, method, request, ...(flag ? { flag } : {}) } satisfies ToServer);
    });
  const api = new Proxy({} as Client<T>, {
    get: (_, method) =>
      typeof method === 'string' && method !== 'then'
        ? (request: unknown, options?: CallOptions<unknown>) => invoke(method, request, options)
        : undefined,
  });
  return {
    api,
    close(reason) {
      closed = reason;
      for (const call of open.values()) call.reject(reason);
      open.clear();
    },
  };
}
