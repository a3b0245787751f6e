import { describe, expect, it, vi, type Mock } from 'vitest';
import { CancelledError, UserError } from '../../src/core/data/errors';
import type { Card, RunEvent, RunResult } from '../../src/core/protocol/engine';
import { LookSession } from '../../src/extension/look/look-session';
import type { Services } from '../../src/extension/services';
import { fakes } from './fake-vscode';

vi.mock('vscode', async () => (await import('./fake-vscode')).vscode);

const text = (segment: number): string =>
  `{ "fringe": 1, "inputs": { "a": { "file": "a.h5" } },
     "steps": [ { "id": "look", "do": "overview", "of": ["a"] },
                { "id": "noise", "do": "noise-spectrum", "of": ["a"], "segment": ${segment} } ] }`;

const card = (id: string, state: Card['state'] = 'done'): Card => ({
  id,
  do: 'overview',
  title: 'Overview',
  of: ['a'],
  state,
  sentence: '',
  numbers: [],
  warnings: [],
  figures: [],
  tables: [],
});
const result: RunResult = {
  cards: [],
  diagnostics: [],
  inputs: [],
  engine: { version: '0', kernels: 'plain' },
};

interface RunOptions {
  readonly signal?: AbortSignal;
  readonly onEvent?: (e: RunEvent) => void;
}

interface Run {
  readonly text: string;
  readonly signal: AbortSignal;
  event(e: RunEvent): void;
  end(): void;
  fail(e: Error): void;
}

/** A session on a fake document and a fake engine whose runs the test drives. */
function open(): {
  session: LookSession;
  runs: Run[];
  edit: (text: string) => void;
  states: () => string[];
  redraw: Mock;
} {
  const runs: Run[] = [];
  const redraw = vi.fn();
  const document = fakes.document('/data/a.fringe.json', text(4));
  const api = {
    steps: () => Promise.resolve([]),
    check: () => Promise.resolve([]),
    run: (request: { text: string }, options: RunOptions = {}) =>
      new Promise<RunResult>((resolve, reject) => {
        runs.push({
          text: request.text,
          signal: options.signal ?? new AbortController().signal,
          event: options.onEvent ?? (() => undefined),
          end: () => resolve(result),
          fail: reject,
        });
      }),
    redraw,
  };
  const services = {
    engine: { api, steps: api.steps },
    log: { error: vi.fn() },
    recent: { add: vi.fn() },
  } as unknown as Services;
  const session = new LookSession(document.object, services);
  return {
    session,
    runs,
    redraw,
    edit: document.edit,
    states: () => session.outline().heads.map((h) => h.state),
  };
}

const started = (runs: Run[], count: number): Promise<void> =>
  vi.waitFor(() => {
    if (runs.length < count) throw new Error(`${runs.length} runs so far`);
  });

async function done(): Promise<ReturnType<typeof open>> {
  const all = open();
  await started(all.runs, 1);
  all.runs[0].event({ type: 'waiting', ids: ['look', 'noise'] });
  all.runs[0].event({ type: 'card', card: card('look') });
  all.runs[0].event({ type: 'card', card: card('noise') });
  all.runs[0].end();
  await vi.waitFor(() => expect(all.session.run.state).toBe('idle'));
  return all;
}

describe('a look', () => {
  it('runs when it is opened and shows cards as they come', async () => {
    const { runs, states, session } = open();
    await started(runs, 1);
    runs[0].event({ type: 'waiting', ids: ['look', 'noise'] });
    runs[0].event({ type: 'card', card: card('look') });
    expect(states()).toEqual(['done', 'waiting']);
    expect(session.run.state).toBe('running');
    session.dispose();
  });

  it('marks only what an edit touches as stale, and runs again after a pause', async () => {
    const { runs, states, edit, session } = await done();
    edit(text(8));
    expect(states()).toEqual(['done', 'stale']);
    await started(runs, 2);
    expect(runs[1].text).toBe(text(8));
    session.dispose();
  });

  it('abandons a run that an edit has overtaken and takes nothing more from it', async () => {
    const { runs, states, edit, session } = open();
    await started(runs, 1);
    edit(text(8));
    expect(runs[0].signal.aborted).toBe(true);
    runs[0].event({ type: 'card', card: card('noise') });
    expect(states()).toEqual(['waiting', 'waiting']);
    session.dispose();
  });

  it('keeps the last good cards, stale, while the text cannot be read', async () => {
    const { states, edit, session } = await done();
    edit('{ oops');
    expect(states()).toEqual(['stale', 'stale']);
    expect(session.outline().problems.length).toBeGreaterThan(0);
    expect(session.state().cards[0].card).toBeDefined();
    edit(text(4));
    expect(states()).toEqual(['done', 'done']);
    session.dispose();
  });

  it('fails its open cards with the reason when the engine dies, and can be run again', async () => {
    const { runs, states, session } = open();
    await started(runs, 1);
    runs[0].event({ type: 'waiting', ids: ['look', 'noise'] });
    runs[0].event({ type: 'card', card: card('look') });
    runs[0].fail(new Error('the engine stopped: out of memory; it was started again'));
    await vi.waitFor(() => expect(states()).toEqual(['done', 'failed']));
    const [, noise] = session.outline().heads;
    expect(noise.failure?.message).toContain('out of memory');
    expect(session.run.state).toBe('broken');
    void session.runNow(true);
    await started(runs, 2);
    session.dispose();
  });

  it('shows what was not reached as cancelled, not as failed', async () => {
    const { runs, states, session } = open();
    await started(runs, 1);
    runs[0].event({ type: 'waiting', ids: ['look', 'noise'] });
    session.cancel();
    expect(runs[0].signal.aborted).toBe(true);
    runs[0].fail(new CancelledError());
    await vi.waitFor(() => expect(states()).toEqual(['cancelled', 'cancelled']));
    expect(session.run.state).toBe('idle');
    session.dispose();
  });

  it('waits for trust when the recipe reads outside of an untrusted folder', async () => {
    fakes.trust(false, '/elsewhere');
    const { runs, session } = open();
    await vi.waitFor(() => expect(session.run.state).toBe('held'));
    expect(session.run.message).toContain('a.h5');
    expect(runs).toHaveLength(0);
    fakes.trust(true, '/data');
    void session.runNow();
    await started(runs, 1);
    session.dispose();
  });

  it('runs a step again when the engine has dropped the result to be redrawn', async () => {
    const { session, runs, redraw } = await done();
    redraw.mockRejectedValueOnce(new UserError('evicted', 'gone')).mockResolvedValueOnce(['figure']);
    const figures = session.redraw('noise', 'print', { width: 300 });
    await started(runs, 2);
    runs[1].end();
    expect(await figures).toEqual(['figure']);
    session.dispose();
  });
});
