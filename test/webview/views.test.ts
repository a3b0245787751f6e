import { describe, expect, it, vi } from 'vitest';
import { Views } from '../../webview/figure/views';
import { spectrumFigure, timeFigure } from './figures';

const later = timeFigure({
  x: { label: 'Time', unit: 's', scale: 'linear', link: 'time', epoch: '1400000002', extent: [0, 20] },
});
const far = timeFigure({
  x: { label: 'Time', unit: 's', scale: 'linear', link: 'time', epoch: '1500000000', extent: [0, 20] },
});

function three(): Views {
  const views = new Views();
  views.register('a', timeFigure());
  views.register('b', later);
  views.register('f', spectrumFigure());
  return views;
}

describe('views', () => {
  it('moves figures of one link group together, times carried over between epochs', () => {
    const views = three();
    const told = vi.fn();
    views.onChange(told);
    views.set('a', { x: [4, 6] });
    expect(views.of('b')).toEqual({ x: [2, 4] });
    expect(views.of('f')).toEqual({});
    expect(told).toHaveBeenCalledOnce();
  });

  it('keeps the value range of the others, and resets all together', () => {
    const views = three();
    views.set('b', { y: [0, 1] });
    expect(views.of('a')).toEqual({});
    views.set('a', { x: [4, 6] });
    expect(views.of('b')).toEqual({ x: [2, 4], y: [0, 1] });
    views.set('a', {});
    expect(views.of('b')).toEqual({ y: [0, 1] });
  });

  it('leaves figures alone that show none of the span, and unlinked ones', () => {
    const views = three();
    views.register('far', far);
    views.set('a', { x: [4, 6] });
    expect(views.of('far')).toEqual({});
    views.setLinked('time', false);
    views.set('a', { x: [1, 2] });
    expect(views.of('b')).toEqual({ x: [2, 4] });
  });

  it('survives being saved and read back', () => {
    const views = three();
    views.set('a', { x: [4, 6] });
    views.setLinked('frequency', false);
    const back = new Views(JSON.parse(JSON.stringify(views.save())) as ReturnType<Views['save']>);
    expect(back.of('a')).toEqual({ x: [4, 6] });
    expect(back.isLinked('frequency')).toBe(false);
    expect(back.isLinked('time')).toBe(true);
  });

  it('counts what is on the page', () => {
    const views = new Views();
    const gone = views.register('a', timeFigure());
    expect(views.count('time')).toBe(1);
    gone();
    expect(views.count('time')).toBe(0);
  });
});
