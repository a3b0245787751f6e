import { scaleLinear, scaleLog } from 'd3-scale';
import type { Axis } from '../figure';
import { numberText } from '../shown-number';

/** An axis laid out on paper: where values go, and its labelled and unlabelled ticks. */
export interface Placed {
  at(value: number): number;
  readonly ticks: readonly { readonly at: number; readonly label: string }[];
  readonly minor: readonly number[];
  readonly range: readonly [number, number];
}

/** Lays `range` of an axis out between two coordinates with about `wanted` labels. */
export function placed(
  axis: Axis,
  range: readonly [number, number],
  from: number,
  to: number,
  wanted: number,
): Placed {
  const [low, high] = widened(range, axis.scale);
  if (axis.scale === 'linear') {
    const scale = scaleLinear().domain([low, high]).range([from, to]);
    const values = scale.ticks(wanted);
    return {
      at: (v) => scale(v),
      ticks: values.map((v) => ({ at: scale(v), label: numberText(v, 6) })),
      minor: [],
      range: [low, high],
    };
  }
  const scale = scaleLog().domain([low, high]).range([from, to]);
  const all = scale.ticks();
  const decades = Math.log10(high / low);
  const labelled = all.filter((v) => {
    const power = Math.round(Math.log10(v));
    const lead = Math.round(v / 10 ** Math.floor(Math.log10(v) + 1e-9));
    return decades > 1.6 ? lead === 1 && power % Math.ceil(decades / wanted) === 0 : [1, 2, 5].includes(lead);
  });
  return {
    at: (v) => scale(v),
    ticks: labelled.map((v) => ({ at: scale(v), label: logLabel(v) })),
    minor: all.filter((v) => !labelled.includes(v)).map((v) => scale(v)),
    range: [low, high],
  };
}

const logLabel = (v: number): string => numberText(v, 3).replace(/^1 × /, '');

/** A range with room that is not empty and, on a logarithmic axis, positive. */
function widened([a, b]: readonly [number, number], scale: Axis['scale']): [number, number] {
  if (scale === 'log') {
    const low = a > 0 ? a : b > 0 ? b / 1e3 : 1;
    return b > low ? [low, b] : [low / 2, low * 2];
  }
  if (b > a) return [a, b];
  const room = Math.abs(a) * 0.1 || 1;
  return [a - room, a + room];
}
