import { addSeconds, formatGps, utcText } from '../data/gps-time';
import type { SnrSeries } from '../data/kinds';
import { complementSpans } from '../data/spans';
import { columnsOf, timeAxis } from './axis';
import type { Figure, Mark, Viewport } from './figure';
import { counted, numberText, repeated } from './number-text';
import { spanMarks } from './series';
import { thinLine } from './thin';

/** Peaks that get a mark; the table has the rest. */
const MARKED = 5;

/** |SNR| against time, largest and smallest value of each pixel column, with the loudest peaks marked. */
export function snrFigure(snr: SnrSeries, expected: number, viewport: Viewport): Figure {
  const { rate, length, re, im, peaks } = snr;
  const gps = timeAxis(snr.start, length / rate, viewport);
  const x = snr.startUnknown === true ? { ...gps, label: 'Time after the first sample' } : gps;
  const columns = columnsOf(x, viewport);
  const from = Math.max(0, Math.floor(columns.from * rate) - 1);
  const to = Math.min(length, Math.ceil(columns.to * rate) + 2);
  const times = new Float64Array(to - from);
  const values = new Float64Array(to - from);
  for (let i = from; i < to; i++) {
    times[i - from] = i / rate;
    values[i - from] = Math.hypot(re[i], im[i]);
  }
  const line = thinLine(times, values, columns);
  const gaps = complementSpans([...snr.valid, ...snr.spoilt], length);
  const half = (columns.to - columns.from) / columns.width;
  const events: Mark[] = peaks.slice(0, MARKED).map((p, i) => ({
    role: 'event',
    from: p.at / rate - half,
    to: p.at / rate + half,
    label: `${i === 0 ? 'loudest' : `number ${i + 1}`}, |SNR| ${numberText(p.snr)}`,
  }));
  const top = peaks.at(0);
  const time = top && addSeconds(snr.start, Math.round((top.at / rate) * 1e6) / 1e6);
  const words = [
    `Modulus of the signal-to-noise ratio of ${snr.template.label} against time of its ${snr.template.origin}.`,
    top && time
      ? `Loudest ${numberText(top.snr)} at GPS ${formatGps(time)}${snr.startUnknown === true ? '' : ` (${utcText(time)})`}.`
      : '',
    `The level noise alone is expected to reach once is ${numberText(expected, 3)}.`,
    snr.spoilt.length > 0 ? `${counted(snr.spoilt.length, 'edge')} without a valid value marked.` : '',
  ];
  return {
    id: 'snr',
    title: 'Signal-to-noise ratio',
    caption: words.filter((w) => w !== '').join(' ') + repeated(snr.notes),
    x,
    y: {
      label: '|SNR|',
      unit: '',
      scale: 'linear',
      extent: [0, Math.max(expected, top?.snr ?? 0) * 1.05],
    },
    traces: [
      { type: 'line', name: '|SNR|', role: 'data', ...line },
      {
        type: 'line',
        name: 'expected loudest in Gaussian noise',
        role: 'reference',
        x: Float64Array.of(columns.from, columns.to),
        y: Float64Array.of(expected, expected),
      },
    ],
    marks: [
      ...spanMarks(gaps, snr.filter.series, columns, 'gap', 'gap'),
      ...spanMarks(snr.spoilt, snr.filter.series, columns, 'cropped', 'edge without a valid value'),
      ...events,
    ],
  };
}
