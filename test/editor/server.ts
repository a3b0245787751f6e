import { spawn } from 'node:child_process';
import { createWriteStream } from 'node:fs';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { until } from './options';
import type { Profile } from './profile';

/** The running server of the editor: serves the web workbench and runs the extension host. */
export interface EditorServer {
  readonly port: number;
  readonly url: string;
  stop(): Promise<void>;
}

/** Starts the server on a free loopback port; it dies with this process at the latest. */
export async function startServer(profile: Profile): Promise<EditorServer> {
  const port = await freePort();
  const [program, ...args] = profile.command;
  const child = spawn(
    program,
    [
      ...args,
      ...['--host', '127.0.0.1', '--port', String(port), '--without-connection-token'],
      ...['--disable-workspace-trust', '--disable-getting-started-override', '--enable-smoke-test-driver'],
    ],
    // its own process group, so that stopping reaches the extension host too
    { env: profile.env, stdio: ['ignore', 'pipe', 'pipe'], detached: true },
  );
  const log = createWriteStream(join(profile.dir, 'server.log'));
  child.stdout.pipe(log);
  child.stderr.pipe(log);
  const gone = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  const signal = (name: 'SIGTERM' | 'SIGKILL'): void => {
    try {
      process.kill(-child.pid!, name);
    } catch {
      // the group is gone already
    }
  };
  const atExit = (): void => signal('SIGKILL');
  process.once('exit', atExit);
  const url = `http://127.0.0.1:${port}`;
  const server: EditorServer = {
    port,
    url,
    async stop() {
      signal('SIGTERM');
      await Promise.race([gone, new Promise((resolve) => setTimeout(resolve, 5000))]);
      signal('SIGKILL');
      process.off('exit', atExit);
    },
  };
  try {
    await until(`the editor's server to answer (log: ${profile.dir}/server.log)`, async () => {
      if (child.exitCode !== null) return 'ended';
      return (await fetch(`${url}/version`)).ok;
    });
    if (child.exitCode !== null)
      throw new Error(
        `the editor's server ended with exit code ${child.exitCode}: ${profile.dir}/server.log`,
      );
  } catch (error) {
    await server.stop();
    throw error;
  }
  return server;
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() => {
        if (address !== null && typeof address === 'object') resolve(address.port);
        else reject(new Error('no free port'));
      });
    });
  });
}
