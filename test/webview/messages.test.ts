import { describe, expect, it } from 'vitest';
import { pack, unpack } from '../../src/core/protocol/panel';

describe('messages between editor and page', () => {
  const message = {
    type: 'edit',
    values: [1, NaN, -Infinity, null, 'text', true],
    params: { removed: undefined, nested: { deep: Infinity } },
  };

  it('keep NaN, infinities and undefined through JSON', () => {
    const wire = JSON.stringify(pack(message));
    const back = unpack(JSON.parse(wire)) as typeof message;
    expect(back).toEqual(message);
    expect('removed' in back.params).toBe(true);
  });

  it('leave typed arrays as they are, so they travel as buffers', () => {
    const x = Float64Array.of(1, NaN);
    const packed = pack({ x }) as { x: Float64Array };
    expect(packed.x).toBe(x);
    expect((unpack(packed) as { x: Float64Array }).x).toBe(x);
  });
});
