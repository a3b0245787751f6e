import { MessageChannel } from 'node:worker_threads';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { CancelledError, UserError } from '../../src/core/data/errors';
import type { Call } from '../../src/core/protocol/engine';
import { connect, serve, type Client } from '../../src/core/protocol/rpc';
import { nodePort } from '../../src/host/node-port';

interface Toy {
  add(request: { a: number; b: number }, call: Call<string>): Promise<number>;
  wait(request: object, call: Call<never>): Promise<never>;
  fail(request: { how: 'user' | 'bug' }, call: Call<never>): Promise<never>;
}

let channel: MessageChannel;
let client: { api: Client<Toy>; close(reason: Error): void };
beforeEach(() => {
  channel = new MessageChannel();
  serve<Toy>(nodePort(channel.port1), {
    add: ({ a, b }, call) => {
      call.event('adding');
      return Promise.resolve(a + b);
    },
    wait: async (_, call) => {
      while (!call.cancelled()) await new Promise((r) => setImmediate(r));
      throw new CancelledError();
    },
    fail: ({ how }) =>
      Promise.reject(
        how === 'user' ? new UserError('no-file', 'no such file', '/x') : new TypeError('a bug'),
      ),
  });
  client = connect<Toy>(nodePort(channel.port2));
});
afterEach(() => {
  channel.port1.close();
  channel.port2.close();
});

test('a result comes back after its events', async () => {
  const events: string[] = [];
  expect(await client.api.add({ a: 1, b: 2 }, { onEvent: (e) => events.push(e) })).toBe(3);
  expect(events).toEqual(['adding']);
});

test('errors keep their kind, code, place and stack', async () => {
  await expect(client.api.fail({ how: 'user' })).rejects.toMatchObject({
    name: 'UserError',
    code: 'no-file',
    where: '/x',
  });
  const bug = await client.api.fail({ how: 'bug' }).catch((e: unknown) => e as Error);
  expect(bug).toMatchObject({ name: 'TypeError', message: 'a bug' });
  expect(bug.stack).toContain('rpc.test');
});

test('an abort reaches the server and ends the call as cancelled', async () => {
  const stop = new AbortController();
  const waiting = client.api.wait({}, { signal: stop.signal });
  setTimeout(() => stop.abort(), 5);
  await expect(waiting).rejects.toBeInstanceOf(CancelledError);
  await expect(client.api.wait({}, { signal: stop.signal })).rejects.toBeInstanceOf(CancelledError);
});

test('closing fails what is open and what comes later, with the reason', async () => {
  const waiting = client.api.wait({});
  client.close(new Error('the engine stopped'));
  await expect(waiting).rejects.toThrow('the engine stopped');
  await expect(client.api.add({ a: 1, b: 1 })).rejects.toThrow('the engine stopped');
});
