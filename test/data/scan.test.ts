import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import {
  MOST_CELLS,
  envelopeCell,
  scanSamples,
  type Hasher,
  type SampleScan,
  type ScanOptions,
} from '../../src/core/data/scan';

function scan(x: Float64Array, options: ScanOptions = {}): Promise<SampleScan> {
  return scanSamples((from, to, into) => into.set(x.subarray(from, to)), x.length, options);
}

function sha(): Hasher {
  const h = createHash('sha256');
  return { update: (b) => void h.update(b), digest: () => h.digest('hex') };
}

/** Deterministic values in (-1, 1) that never repeat in a row (multiplicative congruential, Park and Miller 1988). */
function noise(n: number): Float64Array {
  let s = 42;
  return Float64Array.from({ length: n }, () => {
    s = (s * 48271) % 2147483647;
    return (2 * s) / 2147483647 - 1;
  });
}

describe('one pass over samples', () => {
  it('gives extremes, mean and rms of a known series across blocks', async () => {
    const n = 200_001;
    const x = Float64Array.from({ length: n }, (_, i) => i - 100_000);
    const r = await scan(x);
    expect(r.stats).toMatchObject({ count: n, notFinite: 0, saturated: 0, min: -100_000, max: 100_000 });
    expect(r.stats.mean).toBeCloseTo(0, 9);
    // Sum of squares 1²+…+m² = m(m+1)(2m+1)/6, both signs.
    const m = 100_000;
    expect(r.stats.rms).toBeCloseTo(Math.sqrt((m * (m + 1) * (2 * m + 1)) / 3 / n), 6);
    expect(r.valid).toEqual([{ from: 0, to: n }]);
  });

  it('hashes samples as little-endian float64 with one pattern for NaN', async () => {
    const x = new Float64Array([1, -2.5, NaN, Infinity, 0]);
    new Uint32Array(x.buffer).set([1, 0xfff80001], 4); // another NaN
    const expected = createHash('sha256')
      .update(
        Buffer.from(
          '000000000000f03f' +
            '00000000000004c0' +
            '000000000000f87f' +
            '000000000000f07f' +
            '0000000000000000',
          'hex',
        ),
      )
      .digest('hex');
    const r = await scan(x, { hasher: sha() });
    expect(r.sha256).toBe(expected);
  });

  it('hashes the same in one block and in many', async () => {
    const x = noise(150_000);
    x[70_000] = NaN;
    const bytes = Buffer.from(x.buffer.slice(0));
    const r = await scan(x, { hasher: sha() });
    expect(r.sha256).toBe(createHash('sha256').update(bytes).digest('hex'));
  });

  it('splits valid spans at every sample that is not finite', async () => {
    const x = noise(140_000);
    x[0] = NaN;
    x[65_535] = Infinity;
    x[65_536] = NaN;
    x[139_999] = -Infinity;
    const r = await scan(x);
    expect(r.stats.notFinite).toBe(4);
    expect(r.valid).toEqual([
      { from: 1, to: 65_535 },
      { from: 65_537, to: 139_999 },
    ]);
    expect(r.notFinite.spans).toContainEqual({ from: 65_535, to: 65_537 });
    expect(r.stats.max).toBeLessThan(1);
  });

  it('counts samples outside the runs as missing, not as bad', async () => {
    const x = noise(1000);
    x.fill(NaN, 300, 400);
    x[500] = NaN;
    const runs = [
      { from: 0, to: 300 },
      { from: 400, to: 1000 },
    ];
    const r = await scan(x, { runs });
    expect(r.missing).toBe(100);
    expect(r.stats.notFinite).toBe(1);
    expect(r.valid).toEqual([
      { from: 0, to: 300 },
      { from: 400, to: 500 },
      { from: 501, to: 1000 },
    ]);
  });

  it('gives NaN statistics when nothing is finite', async () => {
    const r = await scan(new Float64Array(20).fill(NaN));
    expect(r.valid).toEqual([]);
    expect(r.stats.min).toBeNaN();
    expect(r.stats.rms).toBeNaN();
    expect(r.envelope.low[0]).toBeNaN();
  });
});

describe('saturation', () => {
  it('finds runs at both ends of the range, also across a block border', async () => {
    const x = noise(200_000);
    x.fill(1, 1000, 1008);
    x.fill(-1, 65_530, 65_560);
    const r = await scan(x, { rate: 4096 });
    expect(r.saturated.spans).toEqual([
      { from: 1000, to: 1008 },
      { from: 65_530, to: 65_560 },
    ]);
    expect(r.stats.saturated).toBe(38);
    expect(r.valid).toEqual([{ from: 0, to: 200_000 }]);
  });

  it('finds a run that the series begins or ends with', async () => {
    const x = noise(10_000);
    x.fill(1, 0, 20);
    x.fill(-1, 9990, 10_000);
    const r = await scan(x, { rate: 4096 });
    expect(r.saturated.spans).toEqual([
      { from: 0, to: 20 },
      { from: 9990, to: 10_000 },
    ]);
  });

  it('says nothing of seven equal samples, or of a flat stretch inside the range', async () => {
    const x = noise(10_000);
    x.fill(1, 100, 107);
    x.fill(0.25, 5000, 6000);
    const r = await scan(x, { rate: 4096 });
    expect(r.stats.saturated).toBe(0);
  });

  it('forgets an earlier extreme when a larger sample comes', async () => {
    const x = noise(10_000);
    x.fill(1, 100, 200);
    x[9000] = 1.5;
    const r = await scan(x, { rate: 4096 });
    expect(r.saturated.spans).toEqual([]);
  });

  it('does not call a mask or a constant saturated', async () => {
    const mask = Float64Array.from({ length: 4096 }, (_, i) => (i % 100 < 90 ? 127 : 3));
    expect((await scan(mask)).stats.saturated).toBe(0);
    expect((await scan(new Float64Array(100).fill(5))).stats.saturated).toBe(0);
  });

  it('finds digital zero of at least 0.05 s', async () => {
    const x = noise(10_000);
    x.fill(0, 100, 305); // 0.05 s at 4096 Hz is 204.8 samples
    x.fill(0, 5000, 5204);
    const r = await scan(x, { rate: 4096 });
    expect(r.zeros.spans).toEqual([{ from: 100, to: 305 }]);
  });

  it('calls zeros at the bottom of the range a drop-out, not clipping', async () => {
    const x = noise(10_000).map(Math.abs);
    x.fill(0, 4000, 5000);
    const r = await scan(x, { rate: 4096 });
    expect(r.zeros.samples).toBe(1000);
    expect(r.stats.saturated).toBe(0);
  });
});

describe('envelope', () => {
  it('has at most 2^15 cells and loses no extreme', async () => {
    const x = noise(300_000);
    x[123_456] = 7;
    x[299_999] = -9;
    const { envelope } = await scan(x);
    expect(envelope.cell).toBe(16);
    expect(envelope.low.length).toBe(18_750);
    expect(envelope.high[Math.floor(123_456 / 16)]).toBe(7);
    expect(envelope.low[18_749]).toBe(-9);
    for (let c = 0; c < 500; c++) {
      const part = x.subarray(c * 16, c * 16 + 16);
      expect(envelope.low[c]).toBe(Math.min(...part));
      expect(envelope.high[c]).toBe(Math.max(...part));
    }
  });

  it('chooses cells as powers of two', () => {
    expect(envelopeCell(MOST_CELLS)).toBe(1);
    expect(envelopeCell(MOST_CELLS + 1)).toBe(2);
    expect(envelopeCell(4096 * 16384)).toBe(2048);
  });
});

describe('polling', () => {
  it('reports rising fractions up to 1 and ends when the callback throws', async () => {
    const seen: number[] = [];
    await scan(noise(200_000), { block: (f) => void seen.push(f) });
    expect(seen).toEqual([...seen].sort((a, b) => a - b));
    expect(seen.at(-1)).toBe(1);
    const stop = scan(noise(200_000), {
      block: () => {
        throw new Error('enough');
      },
    });
    await expect(stop).rejects.toThrow('enough');
  });
});
