import { expect, test } from 'vitest';
import { Heap } from '../../src/core/kernels/heap';
import { samples } from './load-kernels';

const make = (): Heap => new Heap(new WebAssembly.Memory({ initial: 1, maximum: 400 }), 1000);

test('blocks do not overlap, are aligned, and everything freed can be had again', () => {
  const heap = make();
  const u = samples(4000, 12).map((v) => v + 0.5);
  const held: { at: number; bytes: number }[] = [];
  for (let i = 0; i < 2000; i++) {
    if (u[2 * i] < 0.55 || held.length === 0) {
      const bytes = 1 + Math.floor(u[2 * i + 1] * 5000);
      const at = heap.alloc(bytes);
      expect(at % 64).toBe(0);
      expect(held.every((h) => at + bytes <= h.at || h.at + h.bytes <= at)).toBe(true);
      held.push({ at, bytes });
    } else {
      const [gone] = held.splice(Math.floor(u[2 * i + 1] * held.length), 1);
      heap.release(gone.at);
    }
  }
  const most = heap.reserved;
  for (const h of held) heap.release(h.at);
  expect(heap.used).toBe(0);
  const whole = heap.alloc(most - 2048);
  expect(heap.reserved).toBe(most);
  heap.release(whole);
});

test('the limit is an error that says what to do', () => {
  const heap = make();
  expect(() => heap.alloc(401 * 65536)).toThrow(/needs 26 MiB of kernel memory.*shorter span/);
  expect(() => heap.release(64)).toThrow(/freed twice/);
});
