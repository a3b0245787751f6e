// npm run bench [-- --only WORK] [--rounds N] [--json FILE] [--plain]
// CPU time of our kernels over that of SciPy, one thread each, round by round in one run; medians.
import { spawn, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { createInterface } from 'node:readline';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { parseArgs } from 'node:util';
import { build } from 'esbuild';
import { buildWasm } from '../scripts/build-wasm.mjs';
import { sections, tiles } from './data.mjs';
import { works } from './works.mjs';

const { values: options } = parseArgs({
  options: {
    only: { type: 'string' },
    rounds: { type: 'string', default: '9' },
    json: { type: 'string' },
    plain: { type: 'boolean', default: false },
  },
});
const root = fileURLToPath(new URL('..', import.meta.url));
const folder = mkdtempSync(`${tmpdir()}/kernel-bench-`);
const python = process.env.FRINGESIDE_PYTHON ?? 'python3';

/** The kernels as they are in src, bundled now. */
async function loadKernels() {
  const outfile = `${folder}/kernels.mjs`;
  const contents =
    "export * from './src/core/kernels/kernels'; export * from './src/core/kernels/wasm-module';";
  await build({
    stdin: { contents, resolveDir: root, loader: 'ts' },
    bundle: true,
    format: 'esm',
    mainFields: ['module', 'main'],
    outfile,
  });
  const { createKernels, compileKernels } = await import(pathToFileURL(outfile).href);
  return createKernels(options.plain ? undefined : compileKernels(readFileSync(await buildWasm())));
}

/** A SciPy process that does one round of a work at a time, or undefined without SciPy. */
function reference() {
  const probe = spawnSync(python, [
    '-c',
    'import scipy, numpy; print(scipy.__version__, "with NumPy", numpy.__version__)',
  ]);
  if (probe.status !== 0) return undefined;
  const env = { ...process.env, OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1', MALLOC_MMAP_MAX_: '0' };
  delete env.OPENBLAS_CORETYPE;
  delete env.OPENBLAS_L2_SIZE;
  const script = fileURLToPath(new URL('reference.py', import.meta.url));
  writeFileSync(`${folder}/setup.json`, JSON.stringify({ sections: sections(), tiles: tiles() }));
  const child = spawn(python, [script, folder], { env, stdio: ['pipe', 'pipe', 'inherit'] });
  const lines = createInterface(child.stdout)[Symbol.asyncIterator]();
  return {
    name: `SciPy ${probe.stdout.toString().trim()}`,
    round: async (name) => {
      child.stdin.write(`${name}\n`);
      const { value, done } = await lines.next();
      if (done) throw new Error(`the SciPy process ended during ${name}`);
      return JSON.parse(value);
    },
    end: () => child.stdin.end(),
  };
}

function ours(run) {
  const start = process.cpuUsage();
  const numbers = run();
  const { user, system } = process.cpuUsage(start);
  return { cpu: (user + system) / 1e6, numbers };
}

function compare(work, a, b) {
  a.forEach((v, i) => {
    if (!(Math.abs(v - b[i]) <= work.tolerance * Math.max(Math.abs(v), Math.abs(b[i]))))
      throw new Error(`${work.name}: result ${i} is ${v}, SciPy has ${b[i]}`);
  });
}

const median = (x) => [...x].sort((a, b) => a - b)[x.length >> 1];
const ms = (seconds) => (seconds * 1000).toFixed(seconds < 1 ? 1 : 0).padStart(9);

async function measure(work, kernels, scipy) {
  const run = work.prepare(kernels, folder);
  for (let i = 0; i < 2; i++) {
    const a = ours(run);
    if (scipy) compare(work, a.numbers, (await scipy.round(work.name)).numbers);
  }
  const times = [];
  for (let i = 0; i < Number(options.rounds); i++) {
    times.push({ ours: ours(run).cpu, scipy: scipy ? (await scipy.round(work.name)).cpu : null });
  }
  const seconds = { ours: median(times.map((t) => t.ours)) };
  const result = {
    work: work.name,
    reference: null,
    ratio: null,
    rounds: times.length,
    bar: work.bar,
    seconds,
  };
  if (!scipy) return result;
  const ratios = times.map((t) => t.ours / t.scipy);
  seconds.reference = median(times.map((t) => t.scipy));
  const spread = [Math.min(...ratios), Math.max(...ratios)];
  return { ...result, reference: scipy.name, ratio: median(ratios), spread };
}

function row(r) {
  const times = ms(r.seconds.ours) + (r.reference ? ` ${ms(r.seconds.reference)}` : '');
  const ratio = r.reference
    ? `${r.ratio.toFixed(3).padStart(8)}  (${r.spread.map((x) => x.toFixed(2)).join(' .. ')})`
    : '';
  return `${r.work.padEnd(20)}${times}${ratio.padEnd(26)}${r.bar}`;
}

async function main() {
  const chosen = works.filter((w) => !options.only || w.name === options.only);
  if (chosen.length === 0)
    throw new Error(`no work ${options.only}; there are ${works.map((w) => w.name).join(', ')}`);
  const scipy = reference();
  console.log(
    scipy
      ? `CPU time of one thread, medians of ${options.rounds} rounds, against ${scipy.name}`
      : `SciPy is absent (${python}): our CPU time only, no ratios`,
  );
  console.log(`${'work'.padEnd(20)}  ours ms  SciPy ms   ratio  (least .. most)  bar`);
  const results = [];
  for (const work of chosen) {
    // Fresh kernels per work: each starts with an empty memory.
    results.push(await measure(work, await loadKernels(), scipy));
    console.log(row(results.at(-1)));
  }
  scipy?.end();
  if (options.json) writeFileSync(options.json, `${JSON.stringify(results, null, 1)}\n`);
}

try {
  await main();
} catch (error) {
  console.error(`bench: ${error.message}`);
  process.exitCode = 1;
} finally {
  rmSync(folder, { recursive: true, force: true });
}
