// Runs in a process of its own, so that its memory can be measured: what the editor's process and its engine worker
// need for a first look at a large file. Prints one JSON line.
import { basename, dirname } from 'node:path';
import { EngineClient } from '../../src/host/engine-client';

const [file, dist] = process.argv.slice(2);
const MiB = 1 << 20;
const rss = (): number => process.memoryUsage().rss / MiB;
const own = (): number => {
  const m = process.memoryUsage();
  return (m.heapUsed + m.external) / MiB;
};

const client = EngineClient.start(dist);
await client.api.steps({});
const before = { rss: rss(), own: own() };
let peak = before.rss;
const watch = setInterval(() => (peak = Math.max(peak, rss())), 20);
const { channels } = await client.api.describe({ file });
const { name } = channels[0];
const preview = await client.api.preview({ file, channel: name, viewport: { width: 900 } });
const previewPeak = peak;
const text = JSON.stringify({
  fringe: 1,
  inputs: { big: { file: basename(file), channel: name } },
  steps: [
    { id: 'look', do: 'overview', of: ['big'] },
    { id: 'noise', do: 'noise-spectrum', of: ['big'] },
  ],
});
const result = await client.api.run({ text, folder: dirname(file) });
clearInterval(watch);
console.log(
  JSON.stringify({
    points: preview.traces.reduce((n, t) => n + (t.type === 'line' ? t.x.length : 0), 0),
    states: result.cards.map((c) => c.state),
    // Main thread alone; resident memory is that of the whole process, so it bounds the worker too.
    hostGrowth: own() - before.own,
    previewGrowth: previewPeak - before.rss,
    growth: peak - before.rss,
  }),
);
await client.dispose();
