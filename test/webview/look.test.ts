import { describe, expect, it } from 'vitest';
import type { Card } from '../../src/core/protocol/engine';
import type { CardHead, LookOutline, LookState, ParamSpec } from '../../src/core/protocol/panel';
import { announcement } from '../../webview/look/announce';
import {
  boundsWords,
  defaultWords,
  fieldText,
  readField,
  sliderBounds,
  sliderPlace,
  sliderValue,
} from '../../webview/look/param-text';
import { assignPorts, ofFromPorts } from '../../webview/look/ports';
import { NOTHING_SAVED, readSaved } from '../../webview/look/saved';
import { reduce, Requests, type PageState } from '../../webview/look/state';
import { readAnswers } from '../../webview/page/answers';
import { timeFigure } from './figures';

const head = (id: string, extra: Partial<CardHead> = {}): CardHead => ({
  id,
  do: 'overview',
  title: 'Overview',
  of: ['alder'],
  params: {},
  off: false,
  state: 'done',
  ...extra,
});
const card = (id: string): Card => ({
  id,
  do: 'overview',
  title: 'Overview',
  of: ['alder'],
  state: 'done',
  sentence: '',
  numbers: [],
  warnings: [],
  figures: [timeFigure()],
  tables: [],
});
const rest = {
  name: 'alder.fringe.json',
  unsaved: true,
  inputs: [],
  problems: [],
  run: { state: 'idle' },
  addable: [],
  names: [],
} as const;
const look: LookState = {
  ...rest,
  steps: [],
  cards: [{ ...head('a'), card: card('a') }, head('b', { state: 'waiting' })],
};
const outline = (heads: readonly CardHead[]): LookOutline => ({ ...rest, heads });

function start(): { state: PageState; requests: Requests } {
  const requests = new Requests();
  const state = reduce(undefined, { type: 'look', seq: 1, state: look }, requests);
  if (!state) throw new Error('the whole state was not taken');
  return { state, requests };
}

describe('page state', () => {
  it('waits for the whole state', () => {
    const message = { type: 'outline', seq: 1, outline: outline([]) } as const;
    expect(reduce(undefined, message, new Requests())).toBeUndefined();
  });

  it('keeps results through an outline, and the same object where nothing changed', () => {
    const { state, requests } = start();
    const heads = [head('b', { state: 'running' }), head('a'), head('c', { state: 'waiting' })];
    const after = reduce(state, { type: 'outline', seq: 2, outline: outline(heads) }, requests)!;
    expect(after.look.cards.map((c) => [c.id, c.state, c.card !== undefined])).toEqual([
      ['b', 'running', false],
      ['a', 'done', true],
      ['c', 'waiting', false],
    ]);
    expect(after.look.cards[1]).toBe(state.look.cards[0]);
  });

  it('drops the result of a step that became another operation', () => {
    const { state, requests } = start();
    const heads = [head('a', { do: 'noise-spectrum', state: 'waiting' })];
    const after = reduce(state, { type: 'outline', seq: 2, outline: outline(heads) }, requests)!;
    expect(after.look.cards[0].card).toBeUndefined();
  });

  it('shows progress and forgets a note that is over', () => {
    const { state, requests } = start();
    const first = reduce(
      state,
      { type: 'progress', seq: 2, id: 'b', fraction: 0.1, note: 'reading' },
      requests,
    )!;
    expect(first.look.cards[1]).toMatchObject({ state: 'running', fraction: 0.1, note: 'reading' });
    const second = reduce(first, { type: 'progress', seq: 3, id: 'b', fraction: 0.2 }, requests)!;
    expect(second.look.cards[1]).not.toHaveProperty('note');
  });

  it('takes the answer to the latest redraw alone, and drops it with the next result', () => {
    const { state, requests } = start();
    const early = requests.start('a/trace');
    const late = requests.start('a/trace');
    const figures = (request: number, title: string) =>
      ({ type: 'figures', seq: 2, request, id: 'a', figures: [timeFigure({ title })] }) as const;
    const one = reduce(state, figures(late, 'late'), requests)!;
    expect(one.redrawn.get('a/trace')?.title).toBe('late');
    const two = reduce(one, figures(early, 'early'), requests)!;
    expect(two.redrawn.get('a/trace')?.title).toBe('late');
    const three = reduce(two, { type: 'card', seq: 4, card: { ...head('a'), card: card('a') } }, requests)!;
    expect(three.redrawn.size).toBe(0);
  });
});

describe('announcements', () => {
  it('says what finished and how a run ended, and nothing when nothing happened', () => {
    const running: LookState = { ...look, run: { state: 'running' } };
    const after: LookState = { ...look, cards: [look.cards[0], { ...head('b'), card: card('b') }] };
    expect(announcement(running, after)).toBe('Overview b: done. Run ended, 2 of 2 steps done');
    expect(announcement(after, after)).toBeUndefined();
  });
});

const number = (extra: Partial<Extract<ParamSpec, { kind: 'number' }>> = {}): ParamSpec => ({
  kind: 'number',
  label: 'Segment',
  help: '',
  unit: 's',
  default: 4,
  min: 0,
  exclusiveMin: true,
  ...extra,
});
const spans: ParamSpec = { kind: 'list', label: 'Leave out', help: '', unit: 's', each: 2, default: [] };
const time: ParamSpec = { kind: 'time', label: 'Centre', help: '', default: null };

describe('parameter fields', () => {
  it('reads numbers and says what is wrong with others', () => {
    expect(readField(number(), ' 1e1 ')).toEqual({ ok: true, value: 10 });
    expect(readField(number(), '')).toEqual({ ok: true, value: undefined });
    expect(readField(number(), '0')).toEqual({ ok: false, message: 'must be more than 0 s, not 0' });
    expect(readField(number(), 'four')).toEqual({ ok: false, message: '"four" is not a number' });
    expect(readField(number({ integer: true }), '1.5')).toMatchObject({ ok: false });
  });
  it('reads lists in groups and times as text that keeps nanoseconds', () => {
    expect(readField(spans, '1, 2; 3.5 4')).toEqual({ ok: true, value: [1, 2, 3.5, 4] });
    expect(readField(spans, '1, 2, 3')).toMatchObject({ ok: false });
    expect(fieldText(spans, [1, 2, 3.5, 4])).toBe('1, 2; 3.5, 4');
    expect(readField(time, '1400000000.000000001')).toEqual({ ok: true, value: '1400000000.000000001' });
    expect(readField(time, 'noon')).toMatchObject({ ok: false });
    expect(fieldText(time, { seconds: 1400000000, nanos: 250000000 })).toBe('1400000000.25');
  });
  it('says bounds and defaults in words', () => {
    expect(boundsWords(number({ max: 64 }))).toBe('above 0 s, at most 64 s');
    expect(boundsWords(spans)).toBe('groups of 2, parted by semicolons');
    expect(defaultWords(number())).toBe('4 s');
    expect(defaultWords(number({ default: null }))).toBe('automatic');
    expect(defaultWords(spans)).toBe('none');
  });
  it('gives sliders bounds where the parameter has none, and maps knob and value both ways', () => {
    expect(sliderBounds(number())).toBeUndefined();
    expect(sliderBounds(number({ slider: 'log' }))).toEqual({ min: 0.125, max: 128 });
    expect(sliderBounds(number({ slider: 'linear', max: 1 }))).toEqual({ min: 0, max: 1 });
    expect(sliderBounds(number({ slider: 'log', default: null, min: 1, max: 100 }))).toEqual({
      min: 1,
      max: 100,
    });
    for (const scale of ['linear', 'log'] as const)
      for (const v of [1, 5, 64])
        expect(sliderValue(sliderPlace(v, 1, 64, scale), 1, 64, scale)).toBeCloseTo(v, 1);
    expect(sliderValue(1, 0.3, 0.7, 'linear')).toBe(0.7);
  });
});

describe('what a step takes', () => {
  const names = [
    { name: 'alder', kind: 'series' },
    { name: 'birch', kind: 'series' },
    { name: 'noise', kind: 'spectrum' },
  ];
  const takes = [
    { kind: 'series', count: 'one', help: '' },
    { kind: 'spectrum', count: 'optional', help: '' },
    { kind: 'series', count: 'many', help: '' },
  ] as const;
  it('is handed out by kind in the order of the ports', () => {
    expect(assignPorts(takes, ['noise', 'birch', 'alder'], names)).toEqual([['birch'], ['noise'], ['alder']]);
    expect(assignPorts(takes, ['gone'], names)).toEqual([[], [], []]);
    expect(ofFromPorts([['birch'], [], ['alder']])).toEqual(['birch', 'alder']);
  });
});

describe('rate form', () => {
  it('needs a rate above 0, and a GPS time if one is given', () => {
    expect(readAnswers('4096', '')).toEqual({ ok: true, answers: { rate: 4096 } });
    expect(readAnswers(' 1e3 ', ' 1400000000.5 ')).toEqual({
      ok: true,
      answers: { rate: 1000, epoch: '1400000000.5' },
    });
    expect(readAnswers('0', '')).toMatchObject({ ok: false });
    expect(readAnswers('', 'noon')).toEqual({
      ok: false,
      rate: 'The rate must be a number of Hz above 0, for example 4096.',
      epoch: expect.stringContaining('"noon" is not a GPS time') as string,
    });
  });
});

describe('what a page left behind', () => {
  it('is taken only in the form this page writes', () => {
    expect(readSaved(undefined)).toEqual(NOTHING_SAVED);
    expect(readSaved({ version: 2, scroll: 5 })).toEqual(NOTHING_SAVED);
    expect(readSaved({ version: 1, scroll: 5 })).toEqual({ ...NOTHING_SAVED, scroll: 5 });
  });
});
