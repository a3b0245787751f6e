#!/usr/bin/env node
import { Engine } from '../../core/recipe/engine';
import type { EngineApi } from '../../core/protocol/engine';
import { distFolder, nodeHost } from '../node-host';
import { runCli } from './cli';
import type { World } from './world';

let interrupted = false;
process.on('SIGINT', () => {
  // The second press ends a run that does not come to its next block.
  if (interrupted) process.exit(130);
  interrupted = true;
});
// A closed pipe (`fringeside steps | head`) is not an error.
process.stdout.on('error', (e: NodeJS.ErrnoException) => {
  if (e.code === 'EPIPE') process.exit(0);
  throw e;
});

let engine: Promise<EngineApi> | undefined;
const world: World = {
  out: (text) => void process.stdout.write(text),
  err: (text) => void process.stderr.write(text),
  progress: process.stderr.isTTY,
  columns: process.stdout.columns || 100,
  cwd: process.cwd(),
  dist: distFolder(),
  engine: () => (engine ??= nodeHost().then((host) => new Engine(host))),
  cancelled: () => interrupted,
};
process.exitCode = await runCli(process.argv.slice(2), world);
