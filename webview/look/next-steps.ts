import { addSeconds, formatGps, parseGps } from '../../src/core/data/gps-time';
import type { Axis } from '../../src/core/figures/figure';
import type { StepDescription } from '../../src/core/protocol/engine';
import type { CardHead, NamedKind, RecipeEdit } from '../../src/core/protocol/panel';
import type { Range } from '../figure/ranges';

type NewStep = Extract<RecipeEdit, { op: 'add' }>['step'];

/** A step that one click adds, and what the button says. */
export interface Offer {
  readonly label: string;
  readonly step: NewStep;
}

/** Kinds that nearly every step takes: naming what follows them would be the whole list again. */
const COMMON = ['series', 'spectrum', 'overview', 'table'];

/**
 * Steps that go on from a card's own result, with everything else they need taken from what the card was made of, else from
 * the newest of its kind.
 */
export function nextSteps(
  card: Pick<CardHead, 'id' | 'of'>,
  names: readonly NamedKind[],
  steps: Iterable<StepDescription>,
): Offer[] {
  const kindOf = new Map(names.map((n) => [n.name, n.kind]));
  const own = kindOf.get(card.id);
  if (own === undefined || own === '' || COMMON.includes(own)) return [];
  const newest = [...names].reverse().map((n) => n.name);
  const offers: Offer[] = [];
  for (const step of steps) {
    if (!step.takes.some((p) => p.kind === own)) continue;
    const of: string[] = [];
    const whole = step.takes.every((port) => {
      const name =
        port.kind === own
          ? card.id
          : port.count === 'optional'
            ? undefined
            : [...card.of, ...newest].find((n) => kindOf.get(n) === port.kind && !of.includes(n));
      if (name !== undefined && !of.includes(name)) of.push(name);
      return name !== undefined || port.count === 'optional';
    });
    if (whole) offers.push({ label: step.title, step: { do: step.id, of } });
  }
  return offers;
}

/** Steps for the stretch of time that a zoomed figure shows. */
export function spanSteps(
  card: Pick<CardHead, 'id' | 'of'>,
  axis: Axis,
  [from, to]: Range,
  names: readonly NamedKind[],
  known: ReadonlySet<string>,
): Offer[] {
  const kindOf = new Map(names.map((n) => [n.name, n.kind]));
  const isSeries = (name: string): boolean => kindOf.get(name) === 'series';
  const series = isSeries(card.id) ? card.id : card.of.find(isSeries);
  if (axis.link !== 'time' || axis.epoch === undefined || series === undefined) return [];
  const gps = (at: number): string => formatGps(addSeconds(parseGps(axis.epoch ?? 0), at));
  const short = (v: number): number => Number(v.toPrecision(7));
  const at = { start: gps(from), duration: short(to - from) };
  const of = [series];
  const offers: Offer[] = [
    { label: 'Map it', step: { do: 'constant-q-map', of, params: at } },
    { label: 'Spectrogram', step: { do: 'spectrogram', of, params: at } },
    {
      label: 'Gate it',
      step: { do: 'gate', of, params: { 'gps-spans': [Number(gps(from)), Number(gps(to))] } },
    },
    ...(kindOf.get(card.id) === 'map'
      ? [] // its axis begins elsewhere than its series
      : [
          {
            label: 'Noise without it',
            step: { do: 'noise-spectrum', of, params: { exclude: [short(from), short(to)] } },
          },
          {
            label: 'Noise of it',
            step: {
              do: 'noise-spectrum',
              of,
              params: {
                exclude: outside(short(from), short(to), axis.extent[1]),
                segment: short(Math.min(4, (to - from) / 8)),
              },
            },
          },
        ]),
  ];
  return offers.filter((o) => known.has(o.step.do));
}

/** Everything but the span, in pairs of seconds after the start. */
function outside(from: number, to: number, end: number): number[] {
  return [...(from > 0 ? [0, from] : []), ...(to < end ? [to, end] : [])];
}
