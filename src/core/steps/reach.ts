import type { Quantity, Warning } from '../data/quantity';
import type { Table } from '../data/table';
import { columnsOf, extentOf } from '../figures/axis';
import type { Axis, Figure, Trace, Viewport } from '../figures/figure';
import { numberText, withUnit } from '../figures/number-text';
import { thinLine } from '../figures/thin';
import { AVERAGE, noiseWeights, reachOf, type Reach, type ReachRequest } from '../signal/horizon';
import { IMR_MASS, IMR_RATIO } from '../waveforms/inspiral-merger-ringdown';
import { defineStep } from './define';

interface ReachTable extends Table {
  readonly curve: readonly Reach[];
}

/** Points of the curve against mass. */
const POINTS = 48;
const FAR = 0.1;

export default defineStep({
  id: 'reach',
  title: 'Reach',
  version: 1,
  group: 'signal',
  summary: 'How far a compact binary could be seen in this noise: horizon and sky average against mass.',
  takes: [{ kind: 'spectrum', count: 'one', help: 'the noise: an estimate, a model or a file' }],
  gives: 'table',
  params: {
    masses: {
      kind: 'list',
      label: 'Total masses',
      unit: 'M☉',
      each: 1,
      default: [2.8, 20, 60],
      min: 0.01,
      help: 'Total masses in the frame of the source for which the reach is given as numbers.',
    },
    ratio: {
      kind: 'number',
      label: 'Mass ratio',
      unit: '',
      default: 1,
      min: 1,
      max: 1000,
      help: 'Larger over smaller mass, for all of them.',
    },
    model: {
      kind: 'choice',
      label: 'Model',
      choices: ['inspiral', 'inspiral-merger-ringdown'],
      default: 'inspiral',
      ask: true,
      help: 'inspiral: amplitude of lowest order up to the last stable orbit, too little for heavy black holes. inspiral-merger-ringdown: black holes without spin, for total masses of 20 M☉ and more.',
    },
    threshold: {
      kind: 'number',
      label: 'Threshold',
      unit: '',
      default: 8,
      min: 0,
      exclusiveMin: true,
      help: 'SNR in this detector at which a source counts as seen: 8 by common practice.',
    },
    low: {
      kind: 'number',
      label: 'From',
      unit: 'Hz',
      default: 20,
      min: 0,
      exclusiveMin: true,
      slider: 'log',
      help: 'Lowest frequency counted.',
    },
    high: {
      kind: 'number',
      label: 'To',
      unit: 'Hz',
      default: null,
      min: 0,
      exclusiveMin: true,
      help: 'Highest frequency counted. Left empty: as far as the noise curve reaches.',
    },
    redshift: {
      kind: 'choice',
      label: 'Redshift',
      choices: ['flat-universe', 'neglected'],
      default: 'flat-universe',
      help: 'flat-universe: masses at the detector are (1 + z) times those of the source, luminosity distance in a flat universe of matter and a cosmological constant. neglected: right for z far below 1 only.',
    },
    hubble: {
      kind: 'number',
      label: 'Hubble constant',
      unit: 'km/s/Mpc',
      default: 70,
      min: 10,
      max: 200,
      help: 'Used with redshift. Published values lie between 67 and 74.',
    },
    matter: {
      kind: 'number',
      label: 'Share of matter',
      unit: '',
      default: 0.3,
      min: 0,
      max: 1,
      help: 'Used with redshift.',
    },
  },
  sources: [
    {
      text: 'Horizon and sky average (factor 2.26478): Finn & Chernoff, Phys. Rev. D 47, 2198 (1993)',
      flag: 'memory',
    },
    { text: 'Luminosity distance: Hogg, astro-ph/9905116 (1999)', flag: 'memory' },
  ],
  async run(inputs, params, context) {
    const spectrum = inputs.one('spectrum');
    const { threshold, ratio, model, low, hubble, matter } = params;
    const request: ReachRequest = {
      spectrum,
      low,
      high: params.high ?? Infinity,
      threshold,
      ratio,
      model,
      ...(params.redshift === 'neglected' ? {} : { universe: { hubble, matter } }),
    };
    const weights = noiseWeights(request);
    const wanted = params.masses.map((m) => reachOf(m, request, weights));
    const [least, most] = [Math.min(1, ...params.masses), Math.max(200, ...params.masses)];
    const curve: Reach[] = [];
    for (let i = 0; i < POINTS; i++) {
      await context.block(i / POINTS);
      curve.push(reachOf(least * (most / least) ** (i / (POINTS - 1)), request, weights));
    }
    const table = tableOf(wanted);
    const data: ReachTable = { ...table, curve };
    const first = wanted.at(0);
    return {
      data,
      sentence:
        `Reach in ${spectrum.label} at SNR ${numberText(threshold)}, ${model} of mass ratio ${numberText(ratio)}, from ${numberText(low)} Hz, redshift ${params.redshift === 'neglected' ? 'neglected' : `in a flat universe (H₀ ${numberText(hubble)} km/s/Mpc, matter ${numberText(matter)})`}` +
        (first
          ? `: ${numberText(first.total)} M☉ to ${withUnit(first.horizon, 'Mpc')} optimally placed, ${withUnit(first.horizon / AVERAGE, 'Mpc')} averaged over sky and orientation.`
          : '.'),
      numbers: wanted.flatMap((r, i): Quantity[] => [
        {
          id: `horizon-${i + 1}`,
          label: `Horizon of ${numberText(r.total)} M☉`,
          value: r.horizon,
          unit: 'Mpc',
          convention: `luminosity distance, straight above and face on, SNR ${numberText(threshold)}${r.redshift > 0 ? `, z = ${numberText(r.redshift, 3)}` : ''}`,
          explain: {
            formula: 'D at which √(4 ∫ |h̃|²/S df) is the threshold',
            source: 'Finn & Chernoff, Phys. Rev. D 47, 2198 (1993)',
          },
        },
        {
          id: `average-${i + 1}`,
          label: `Average reach of ${numberText(r.total)} M☉`,
          value: r.horizon / AVERAGE,
          unit: 'Mpc',
          convention: `horizon / ${AVERAGE}: cube root of the volume seen over all directions and orientations, flat space`,
        },
      ]),
      warnings: warnings(wanted, params.model, ratio, params.redshift),
      tables: [table],
    };
  },
  figures: (data, params, _inputs, viewport) =>
    'curve' in data ? [figure(data as ReachTable, params.model, viewport)] : [],
});

const tableOf = (reaches: readonly Reach[]): Table => ({
  kind: 'table',
  id: 'reach',
  title: 'Reach by mass',
  columns: [
    { id: 'total', label: 'Total mass, source frame', unit: 'M☉' },
    { id: 'horizon', label: 'Horizon', unit: 'Mpc' },
    { id: 'average', label: 'Sky average', unit: 'Mpc' },
    { id: 'redshift', label: 'Redshift of the horizon', unit: '' },
  ],
  rows: reaches.map((r) => [r.total, r.horizon, r.horizon / AVERAGE, r.redshift]),
});

function warnings(wanted: readonly Reach[], model: string, ratio: number, redshift: string): Warning[] {
  const out: Warning[] = [];
  const light = wanted.filter((r) => r.total * (1 + r.redshift) < IMR_MASS);
  if (model !== 'inspiral' && (light.length > 0 || ratio > IMR_RATIO))
    out.push({
      code: 'outside-model',
      severity: 'caution',
      found:
        ratio > IMR_RATIO ? `mass ratio ${numberText(ratio)}` : `total mass ${numberText(light[0].total)} M☉`,
      value: ratio > IMR_RATIO ? ratio : light[0].total,
      consequence: `The model was made for mass ratios up to ${IMR_RATIO} and is used from ${IMR_MASS} M☉ on.`,
      remedy: 'Take the inspiral for light binaries.',
      fix: { kind: 'set', label: 'Take the inspiral', params: { model: 'inspiral' } },
    });
  const heavy = wanted.find((r) => r.total * (1 + r.redshift) > 2 * IMR_MASS);
  if (model === 'inspiral' && heavy)
    out.push({
      code: 'merger-left-out',
      severity: 'note',
      found: `total mass ${numberText(heavy.total)} M☉`,
      value: heavy.total,
      consequence: 'Merger and ring-down lie in the band and are not counted: the true reach is larger.',
      remedy: 'Take inspiral-merger-ringdown for heavy black holes.',
      fix: {
        kind: 'set',
        label: 'Take inspiral–merger–ringdown',
        params: { model: 'inspiral-merger-ringdown' },
      },
    });
  const far = wanted.find((r) => r.redshift > FAR);
  if (far)
    out.push({
      code: 'far',
      severity: 'note',
      found: `${numberText(far.total)} M☉ would be seen to z = ${numberText(far.redshift, 3)}`,
      value: far.redshift,
      consequence:
        'The sky average divides the luminosity distance by the factor of flat space, which is rough there; numbers depend on the universe assumed.',
      remedy: 'State both with the number.',
    });
  if (redshift === 'neglected' && wanted.some((r) => r.horizon > 500))
    out.push({
      code: 'redshift-neglected',
      severity: 'caution',
      found: 'sources beyond 500 Mpc with redshift neglected',
      consequence:
        'Masses at the detector are larger than those of the source; the reach is off by a tenth and more.',
      remedy: 'Set "redshift" to flat-universe.',
      fix: { kind: 'set', label: 'Count redshift', params: { redshift: 'flat-universe' } },
    });
  return out;
}

function figure({ curve }: ReachTable, model: string, viewport: Viewport): Figure {
  const total = Float64Array.from(curve, (r) => r.total);
  const horizon = Float64Array.from(curve, (r) => r.horizon);
  const average = horizon.map((h) => h / AVERAGE);
  const range = viewport.x;
  const x: Axis = {
    label: 'Total mass, source frame',
    unit: 'M☉',
    scale: 'log',
    extent: [total[0], total[total.length - 1]],
    ...(range ? { range } : {}),
  };
  const columns = columnsOf(x, viewport);
  const line = (name: string, y: Float64Array, role: 'data' | 'second'): Trace => ({
    type: 'line',
    name,
    role,
    ...thinLine(total, y, columns),
  });
  return {
    id: 'reach',
    title: 'Reach against mass',
    caption: `Luminosity distance at which a binary (${model}) would have the threshold SNR, against its total mass in the frame of the source: horizon (optimally placed) and average over sky and orientation.`,
    x,
    y: {
      label: 'Luminosity distance',
      unit: 'Mpc',
      scale: 'log',
      extent: extentOf([average, horizon], 'log'),
    },
    traces: [line('horizon', horizon, 'data'), line('average over sky and orientation', average, 'second')],
    marks: [],
  };
}
