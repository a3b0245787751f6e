import { pack, unpack } from '../../src/core/protocol/panel';

interface EditorApi {
  postMessage(message: unknown): void;
  getState(): unknown;
  setState(state: unknown): void;
}
declare function acquireVsCodeApi(): EditorApi;

/** The editor's side as a page sees it. */
export interface Host<To extends { readonly seq: number }, From> {
  post(message: From): void;
  /** Messages in the order of their numbers; one that comes late is dropped. */
  listen(handler: (message: To) => void): void;
  /** What the page left behind when it was last thrown away. */
  saved(): unknown;
  save(state: unknown): void;
}

export function connectHost<To extends { readonly seq: number }, From>(): Host<To, From> {
  const api = acquireVsCodeApi();
  let last = 0;
  const post = (message: unknown): void => api.postMessage(pack(message));
  window.addEventListener('error', (e) =>
    post({ type: 'page-error', message: `${e.message} at ${e.filename}:${e.lineno}` }),
  );
  window.addEventListener('unhandledrejection', (e) =>
    post({ type: 'page-error', message: String(e.reason) }),
  );
  return {
    post,
    listen: (handler) =>
      window.addEventListener('message', (e: MessageEvent<unknown>) => {
        const message = unpack(e.data) as To;
        if (message.seq <= last) return;
        last = message.seq;
        handler(message);
      }),
    saved: () => api.getState(),
    save: (state) => api.setState(state),
  };
}
