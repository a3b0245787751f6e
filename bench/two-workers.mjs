// npm run bench:workers [-- --rounds N]
// Wall time of one recipe on two channels (4096 s at 4096 Hz each) with one worker over that with two, round by round in
// one run; median. Needs two free cores to mean anything.
import { mkdtempSync, rmSync, writeFileSync, openSync, writeSync, closeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { parseArgs } from 'node:util';
import { build } from 'esbuild';
import { gaussian } from './data.mjs';

const { values } = parseArgs({ options: { rounds: { type: 'string', default: '5' } } });
const root = fileURLToPath(new URL('..', import.meta.url));
const folder = mkdtempSync(join(tmpdir(), 'fringeside-workers-'));
const rate = 4096;
const seconds = 4096;

function writeChannel(name, seed) {
  const block = gaussian(rate * 64, seed);
  const fd = openSync(join(folder, `${name}.f64`), 'w');
  for (let k = 0; k < seconds / 64; k++) writeSync(fd, Buffer.from(block.buffer));
  closeSync(fd);
  writeFileSync(
    join(folder, `${name}.f64.json`),
    JSON.stringify({ type: 'float64', byteOrder: 'little', rate }),
  );
}

/** `mark` makes every round's inputs new to the cache. */
const recipe = (mark) =>
  JSON.stringify({
    fringe: 1,
    inputs: { a: { file: 'a.f64', unit: `unit ${mark}` }, b: { file: 'b.f64', unit: `unit ${mark}` } },
    steps: ['a', 'b'].map((c) => ({ id: `noise-${c}`, do: 'noise-spectrum', of: [c] })),
  });

const outfile = join(folder, 'pool.mjs');
await build({
  entryPoints: [join(root, 'src/host/worker-pool.ts')],
  bundle: true,
  platform: 'node',
  format: 'esm',
  mainFields: ['module', 'main'],
  outfile,
  logLevel: 'error',
});
const { WorkerPool } = await import(pathToFileURL(outfile).href);
const pools = [1, 2].map((n) => new WorkerPool(join(root, 'dist'), n));
try {
  writeChannel('a', 1);
  writeChannel('b', 2);
  let mark = 0;
  const time = async (pool) => {
    const from = performance.now();
    const { cards } = await pool.run({ text: recipe(mark++), folder });
    if (cards.some((c) => c.state !== 'done')) throw new Error(cards.map((c) => c.error?.message).join('; '));
    return performance.now() - from;
  };
  for (const pool of pools) await time(pool);
  const ratios = [];
  for (let k = 0; k < Number(values.rounds); k++) {
    const one = await time(pools[0]);
    ratios.push(one / (await time(pools[1])));
  }
  ratios.sort((a, b) => a - b);
  console.log(
    `two workers on two channels: ${ratios[ratios.length >> 1].toFixed(2)} times the throughput of one (${ratios.length} rounds, ${ratios[0].toFixed(2)} to ${ratios.at(-1).toFixed(2)})`,
  );
} finally {
  await Promise.all(pools.map((p) => p.dispose()));
  rmSync(folder, { recursive: true, force: true });
}
