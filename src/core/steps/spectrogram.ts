import { UserError } from '../data/errors';
import { formatGps } from '../data/gps-time';
import type { MapPlane, TimeFrequencyMap } from '../data/kinds';
import type { Warning } from '../data/quantity';
import { mapFigure } from '../figures/map';
import { counted, numberText, repeated, withUnit } from '../figures/number-text';
import { makeWindow } from '../kernels/windows';
import { windowFigures } from '../kernels/window-figures';
import { OVERLAP_PARAM, WINDOW_PARAM } from '../noise/segment-params';
import { amplitudeUnit, densityUnit } from '../noise/units';
import { mapSpan, type MapSpan } from '../picture/map-span';
import { MAP_SPAN_PARAMS } from '../picture/q-params';
import { overMedian, spectrogramRows } from '../picture/spectrogram-cells';
import { defineStep } from './define';

/** Segments from which on a median per frequency means something. */
const FEW = 16;

export default defineStep({
  id: 'spectrogram',
  title: 'Spectrogram',
  version: 1,
  group: 'picture',
  summary: 'Spectra of short segments against time, as density or over the median of each frequency.',
  takes: [{ kind: 'series', count: 'one', help: 'the data' }],
  gives: 'map',
  params: {
    ...MAP_SPAN_PARAMS,
    segment: {
      kind: 'number',
      label: 'Segment',
      unit: 's',
      default: 0.5,
      min: 0,
      exclusiveMin: true,
      slider: 'log',
      ask: true,
      help: 'Length of the pieces. Bins are 1/segment apart; what is shorter than a segment is smeared over it.',
    },
    overlap: OVERLAP_PARAM,
    window: WINDOW_PARAM,
    scale: {
      kind: 'choice',
      label: 'Scale',
      choices: ['over-median', 'density'],
      default: 'over-median',
      help: 'over-median: power over the median power of the same frequency, which shows what changes. density: one-sided amplitude spectral density, which shows lines and the wall.',
    },
    low: {
      kind: 'number',
      label: 'From',
      unit: 'Hz',
      default: 20,
      min: 0,
      slider: 'log',
      help: 'Lowest frequency shown.',
    },
    high: {
      kind: 'number',
      label: 'To',
      unit: 'Hz',
      default: null,
      min: 0,
      exclusiveMin: true,
      slider: 'log',
      help: 'Highest frequency shown. Left empty: half the sample rate.',
    },
  },
  sources: [
    {
      text: 'Modified periodogram of a windowed segment: Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967)',
      flag: 'memory',
    },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const { rate } = series;
    const size = Math.round(params.segment * rate);
    if (size < 8)
      throw new UserError(
        'segment-short',
        `a segment of ${numberText(params.segment)} s has ${size} samples; set "segment" to ${numberText(8 / rate)} s or more`,
      );
    const step = Math.max(1, Math.round(size * (1 - params.overlap)));
    const df = rate / size;
    const high = Math.min(Math.floor(size / 2), Math.floor((params.high ?? rate / 2) / df + 1e-9));
    const low = Math.max(1, Math.ceil(params.low / df - 1e-9));
    if (low >= high)
      throw new UserError(
        'band-empty',
        `between ${numberText(params.low)} and ${numberText(params.high ?? rate / 2)} Hz there are no two bins of ${numberText(df)} Hz: widen the band or lengthen "segment"`,
      );
    const most = (0.3 * context.memoryLimit * step) / (4 * (high - low + 1)) / rate;
    const span = mapSpan(series, params.start, params.duration, most);
    const count = Math.floor((span.to - span.from - size) / step) + 1;
    if (count < 2)
      throw new UserError(
        'segment-long',
        `${withUnit(span.seconds, 's')} hold fewer than two segments of ${withUnit(size / rate, 's')}: shorten "segment"`,
      );
    const window = makeWindow(params.window, size);
    const rows = await spectrogramRows(
      series,
      { from: span.from, size, step, count, low, high, window },
      context.kernels,
      (f) => context.block(f),
    );
    const used = rows[0].values.reduce((n, v) => n + (Number.isNaN(v) ? 0 : 1), 0);
    if (used === 0)
      throw new UserError(
        'no-data',
        `no segment of ${withUnit(size / rate, 's')} lies wholly in valid data of ${series.label}: shorten "segment"`,
      );
    const relative = params.scale === 'over-median';
    const plane: MapPlane = { rows: relative ? overMedian(rows) : rows };
    const loudest = loudestCell(plane);
    const data: TimeFrequencyMap = {
      kind: 'map',
      label: `spectrogram of ${series.label}`,
      channel: series.channel,
      start: span.start,
      duration: span.seconds,
      quantity: relative ? 'Power over the median of the frequency' : 'Amplitude spectral density, one-sided',
      unit: relative ? '' : amplitudeUnit(densityUnit(series.unit)),
      planes: [plane],
      holes: span.holes.map((s) => ({ from: s.from / rate, to: s.to / rate })),
      ...(series.notes ? { notes: series.notes } : {}),
    };
    const enbw = windowFigures(window).enbw * df;
    return {
      data,
      sentence:
        `Spectrogram of ${withUnit(span.seconds, 's', 7)} of ${series.label} from GPS ${formatGps(span.start)}: ${counted(used, 'segment')} of ${withUnit(size / rate, 's')}, ${params.window} window, overlap ${numberText(1 - step / size, 3)}, bins every ${withUnit(df, 'Hz')} (ENBW ${withUnit(enbw, 'Hz')}), ${relative ? 'power over the median power of each frequency' : `one-sided amplitude density in ${data.unit}`}.` +
        repeated(series.notes),
      numbers: [
        { id: 'segments', label: 'Segments', value: used, unit: '', convention: 'wholly in valid data' },
        {
          id: 'resolution',
          label: 'Resolution',
          value: enbw,
          unit: 'Hz',
          convention: 'equivalent noise bandwidth (ENBW) of the window',
        },
        {
          id: 'loudest',
          label: 'Loudest cell',
          value: loudest.value,
          unit: data.unit,
          convention: data.quantity.toLowerCase(),
        },
        {
          id: 'loudest-time',
          label: 'Its time',
          value: loudest.time,
          unit: 's',
          convention: `after GPS ${formatGps(span.start)}, middle of the segment`,
        },
        { id: 'loudest-frequency', label: 'Its frequency', value: loudest.frequency, unit: 'Hz' },
      ],
      warnings: [...shortened(span), ...few(used, relative)],
    };
  },
  figures: (data, params, _inputs, viewport) => {
    const [plane] = data.planes;
    const relative = params.scale === 'over-median';
    return [
      mapFigure(data, viewport, {
        title: 'Spectrogram',
        plane,
        range: relative ? [0.1, 100] : extent(plane),
        scale: 'log',
        marks: data.holes.map((h) => ({
          role: 'gap',
          ...h,
          label: `no valid data, ${numberText(h.to - h.from)} s`,
        })),
        notes: data.notes,
      }),
    ];
  },
});

function loudestCell({ rows }: MapPlane): { value: number; time: number; frequency: number } {
  let best = { value: -Infinity, time: NaN, frequency: NaN };
  for (const { frequency, offset, cell, values } of rows)
    values.forEach((v, i) => {
      if (v > best.value) best = { value: v, time: offset + (i + 0.5) * cell, frequency };
    });
  return best;
}

/** Smallest and largest positive value, at most twelve decades apart. */
function extent({ rows }: MapPlane): [number, number] {
  let [low, high] = [Infinity, 0];
  for (const { values } of rows)
    for (const v of values) {
      if (v > high) high = v;
      if (v > 0 && v < low) low = v;
    }
  return high > 0 ? [Math.max(low, high * 1e-12), high] : [1e-24, 1e-20];
}

function shortened(span: MapSpan): Warning[] {
  if (span.cutFrom === undefined) return [];
  return [
    {
      code: 'map-shortened',
      severity: 'caution',
      found: `the map holds the first ${withUnit(span.seconds, 's')} of ${withUnit(span.cutFrom, 's', 7)}`,
      value: span.seconds,
      consequence: 'What comes later was not looked at.',
      remedy: 'Set "start" and "duration", lower "overlap" or "high", or resample to a lower rate.',
    },
  ];
}

function few(used: number, relative: boolean): Warning[] {
  if (!relative || used >= FEW) return [];
  return [
    {
      code: 'few-segments',
      severity: 'caution',
      found: `the median of each frequency comes from ${counted(used, 'segment')}`,
      value: used,
      consequence: 'What lasts through most of them is taken for normal and does not show.',
      remedy: 'Take a longer span or a shorter "segment", or show the density.',
    },
  ];
}
