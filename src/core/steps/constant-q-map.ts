import { UserError } from '../data/errors';
import { formatGps } from '../data/gps-time';
import type { TimeFrequencyMap } from '../data/kinds';
import { mapFigure } from '../figures/map';
import { counted, numberText, repeated, withUnit } from '../figures/number-text';
import { ownSpectrum } from '../noise/own-spectrum';
import { chanceOf, loudTiles, meanEnergy, tileCount, tileSnr } from '../picture/loud-tiles';
import { mapSpan } from '../picture/map-span';
import { Q_PARAMS } from '../picture/q-params';
import { qNumbers, qTable, qWarnings, type QFacts } from '../picture/q-report';
import { qTiling } from '../picture/q-tiling';
import { bytesPerSecond, qTransform } from '../picture/q-transform';
import { whitenedFor, type Whitened } from '../picture/white-stretch';
import { defineStep } from './define';

/** Parts of the work: own spectrum, whitening, planes. */
const SPECTRUM_SHARE = 0.3;
const WHITEN_SHARE = 0.2;
/** Energies at which the colours end, at least and at most. */
const COLOURS = [12, 50] as const;

export default defineStep({
  id: 'constant-q-map',
  title: 'Constant-Q map',
  version: 1,
  group: 'picture',
  summary: 'Energy over time and frequency at several Q, tiled to a stated mismatch, with the loudest tiles.',
  takes: [
    { kind: 'series', count: 'one', help: 'the data' },
    { kind: 'spectrum', count: 'optional', help: 'their noise; left out, the median spectrum of the data' },
  ],
  gives: 'map',
  params: Q_PARAMS,
  sources: [
    { text: 'Constant Q: Brown, J. Acoust. Soc. Am. 89, 425 (1991)', flag: 'read' },
    {
      text: 'Tiling by mismatch, bisquare window, exponential energies: Chatterji et al., Class. Quantum Grav. 21, S1809 (2004)',
      flag: 'memory',
    },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const { kernels, memoryLimit } = context;
    const { low, mismatch, reach, segment } = params;
    const [qLow, qHigh] = [params['q-low'], params['q-high']];
    if (qLow > qHigh)
      throw new UserError(
        'q-order',
        `"q-low" ${numberText(qLow)} is above "q-high" ${numberText(qHigh)}: it must be the lower one`,
      );
    const top = series.rate / 2;
    const high = Math.min(params.high ?? top, top);
    const tiling = { qLow, qHigh, low, high, top, mismatch };
    const perSecond = bytesPerSecond(qTiling({ ...tiling, duration: 1 }));
    if (perSecond === 0)
      throw new UserError(
        'band-empty',
        `no tile fits between ${numberText(low)} and ${numberText(high)} Hz at ${numberText(series.rate)} Hz sample rate: a window at ${numberText(low)} Hz reaches ${numberText(low * (1 + Math.sqrt(11) / qHigh))} Hz; lower "low" or raise "q-high"`,
      );
    const divide = params.whitening === 'divide';
    const given = inputs.optional('spectrum');
    const spectrum = divide
      ? (given ??
        (await ownSpectrum(series, segment, kernels, memoryLimit / 4, (f) =>
          context.block(SPECTRUM_SHARE * f, 'noise spectrum'),
        )))
      : undefined;
    const white: Whitened = spectrum
      ? whitenedFor(
          kernels,
          series,
          spectrum,
          [Math.min(low / 2, low * (1 - Math.sqrt(11) / qHigh)), top],
          reach,
          8 * 2 ** 20,
        )
      : { series, power: () => 1 };
    const span = mapSpan(white.series, params.start, params.duration, (0.6 * memoryLimit) / perSecond);
    const samples = await readWhite(white, span, (f) =>
      context.block(SPECTRUM_SHARE + WHITEN_SHARE * f, 'whitening'),
    );
    const planes = qTiling({ ...tiling, duration: span.seconds });
    const energies = await qTransform(
      kernels,
      { samples, rate: series.rate, holes: span.holes, power: white.power },
      planes,
      (f) => context.block(SPECTRUM_SHARE + WHITEN_SHARE + (1 - SPECTRUM_SHARE - WHITEN_SHARE) * f),
    );
    const { mean, cells, empty } = meanEnergy(energies);
    if (cells === 0)
      throw new UserError(
        'no-data',
        `every tile touches an edge or a gap: take more than ${withUnit(span.seconds, 's')}, raise "low" or lower "q-high"`,
      );
    const share = cells / (cells + empty);
    const trials = tileCount(planes, share);
    const loud = loudTiles(energies, params.tiles, Math.max(3, Math.log(trials) - 3));
    const data: TimeFrequencyMap = {
      kind: 'map',
      label: `constant-Q map of ${series.label}`,
      channel: series.channel,
      start: span.start,
      duration: span.seconds,
      quantity: 'Energy, mean 1 in noise',
      unit: '',
      planes: energies,
      holes: span.holes.map((s) => ({ from: s.from / series.rate, to: s.to / series.rate })),
      ...(series.notes ? { notes: series.notes } : {}),
      loud,
      trials,
    };
    const facts: QFacts = {
      map: data,
      span,
      loud,
      trials,
      planes: planes.length,
      mean,
      cells,
      empty: 1 - share,
      ...(spectrum && !given && spectrum.estimate ? { ownSegments: spectrum.estimate.segments } : {}),
      white: !divide,
    };
    const first = loud.at(0);
    return {
      data,
      sentence:
        `Constant-Q map of ${withUnit(span.seconds, 's', 7)} of ${series.label} from GPS ${formatGps(span.start)}, ${spectrum ? `whitened with ${spectrum.label}` : 'taken as white'}: ` +
        `${counted(planes.length, 'plane')} of Q ${numberText(planes[0].q, 3)} to ${numberText(planes.at(-1)!.q, 3)}, ${trials} tiles at a mismatch of at most ${numberText(mismatch)}; ` +
        (first
          ? `loudest at ${withUnit(first.time, 's', 6)}, ${withUnit(first.frequency, 'Hz')}, Q ${numberText(first.q, 3)}, energy ${numberText(first.energy)} (SNR ${numberText(tileSnr(first.energy))}).`
          : 'no tile stands out.') +
        repeated(series.notes),
      numbers: qNumbers(facts),
      warnings: qWarnings(facts),
      tables: [qTable(facts)],
    };
  },
  figures: (data, _params, _inputs, viewport) => {
    const loud = data.loud ?? [];
    const first = loud.at(0);
    const plane = data.planes.find((p) => p.q === first?.q) ?? data.planes[0];
    return [
      mapFigure(data, viewport, {
        title: `Constant-Q map, Q ${numberText(plane.q ?? 0, 3)}`,
        plane,
        range: [0, Math.max(COLOURS[0], Math.min(COLOURS[1], 0.6 * (first?.energy ?? 0)))],
        scale: 'linear',
        points: loud
          .filter((t, i) => i === 0 || chanceOf(t.energy, data.trials ?? 1) < 0.5)
          .map((t) => ({
            time: t.time,
            frequency: t.frequency,
            label: `energy ${numberText(t.energy, 3)} at ${numberText(t.time, 6)} s, ${numberText(t.frequency, 4)} Hz, Q ${numberText(t.q, 3)}`,
          })),
        pointsName: 'tiles that stand out, of all Q',
        marks: data.holes.map((h) => ({
          role: 'gap',
          ...h,
          label: `no valid data, ${numberText(h.to - h.from)} s`,
        })),
        note: `Shown is the plane of the loudest tile; there are ${data.planes.length}.`,
        notes: data.notes,
      }),
    ];
  },
});

/** White samples of a span in float32, 0 where not valid. */
async function readWhite(
  { series }: Whitened,
  { from, to }: { readonly from: number; readonly to: number },
  report: (fraction: number) => Promise<void>,
): Promise<Float32Array> {
  const out = new Float32Array(to - from);
  const block = 1 << 17;
  for (let at = from; at < to; at += block) {
    await report((at - from) / (to - from));
    const x = series.read(at, Math.min(to, at + block));
    for (let i = 0; i < x.length; i++) out[at - from + i] = Number.isNaN(x[i]) ? 0 : x[i];
  }
  return out;
}
