import { beforeAll, describe, expect, test } from 'vitest';
import type { Series } from '../../src/core/data/kinds';
import type { Kernels } from '../../src/core/kernels/kernels';
import noiseSpectrum from '../../src/core/steps/noise-spectrum';
import overview from '../../src/core/steps/overview';
import { loadKernels } from '../kernels/load-kernels';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const MB = 2 ** 20;
const rate = 16_384;
let kernels: Kernels;
beforeAll(async () => {
  kernels = (await loadKernels()).wasm;
});

/** Samples that exist nowhere: a table of noise walked through with a stride, so that segments differ. */
function longSeries(seconds: number): { series: Series; longestRead: () => number } {
  const table = gaussianNoise(1 << 20, 1e-21, 17);
  let longest = 0;
  const length = rate * seconds;
  const series: Series = {
    ...seriesOf(new Float64Array(0), rate),
    length,
    valid: [{ from: 0, to: length }],
    read(from, to, into = new Float64Array(to - from)) {
      longest = Math.max(longest, to - from);
      for (let i = from; i < to; i++) into[i - from] = table[(i * 40_503 + (i >>> 18) * 977) & 0xfffff];
      return into;
    },
  };
  return { series, longestRead: () => longest };
}

const bytes = (): number => process.memoryUsage().arrayBuffers;

describe('long series at 16384 Hz', () => {
  test('noise spectrum of 4096 s (512 MiB) by median: memory bounded by the limit, not by the data', async () => {
    const { series, longestRead } = longSeries(4096);
    const limit = 192 * MB;
    const before = bytes() + kernels.memory().reserved;
    let most = 0;
    const run = await runStep(
      noiseSpectrum,
      [series],
      { segment: 4 },
      {
        kernels,
        memoryLimit: limit,
        onBlock: () => (most = Math.max(most, bytes() + kernels.memory().reserved - before)),
      },
    );
    expect(run.number('segments')).toBe(2047);
    // 2047 segments of 32769 bins are 512 MiB of powers: three passes of 192 MiB.
    expect(run.outcome.sentence).toContain('read 3 times');
    expect(longestRead()).toBeLessThanOrEqual(1 << 18);
    expect(most).toBeLessThan(limit + 64 * MB);
    expect(run.blocks).toBeGreaterThan(3 * 200);
    // The table holds only sixteen segments' worth of independent noise.
    expect(run.number('floor') / (1e-21 * Math.sqrt(2 / rate))).toBeCloseTo(1, 1);
  }, 300_000);

  test('overview of 1024 s (128 MiB): memory of a few blocks', async () => {
    const { series, longestRead } = longSeries(1024);
    const before = bytes();
    let most = 0;
    const run = await runStep(
      overview,
      [series],
      {},
      { onBlock: () => (most = Math.max(most, bytes() - before)) },
    );
    expect(longestRead()).toBeLessThanOrEqual(1 << 18);
    expect(most).toBeLessThan(32 * MB);
    expect(run.number('rms') / 1e-21).toBeCloseTo(1, 2);
    expect(run.figures()[0].traces[0]).toMatchObject({ type: 'line' });
  }, 300_000);

  test('stopping: the error of the block call ends the run at once', async () => {
    const { series } = longSeries(4096);
    let calls = 0;
    const stop = runStep(
      noiseSpectrum,
      [series],
      {},
      {
        kernels,
        onBlock: () => {
          if (++calls === 5) throw new Error('stopped by the test');
        },
      },
    );
    await expect(stop).rejects.toThrow('stopped by the test');
    expect(calls).toBe(5);
  });
});
